import { and, eq, isNull } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { db, type Reader } from '../db';
import { personalTokens, units, users, userUnits } from '../db/schema';
import { digestSecret } from './lucia';

export interface UnitOfPerson {
	id: string;
	name: string;
	kind: 'intensive-care' | 'ward' | 'gym';
}

/** The person of an account with the units they belong to now; null when missing or disabled. */
export async function loadPerson(reader: Reader, userId: string): Promise<Person | null> {
	const rows = await reader
		.select({
			id: users.id,
			name: users.name,
			role: users.role,
			senior: users.senior,
			unitId: userUnits.unitId
		})
		.from(users)
		.leftJoin(userUnits, eq(userUnits.userId, users.id))
		.where(and(eq(users.id, userId), isNull(users.disabledAt)));
	const [first] = rows;
	if (!first) {
		return null;
	}
	const unitIds = rows.flatMap((row) => (row.unitId ? [row.unitId] : []));
	const { id, name, role, senior } = first;
	return { kind: 'person', id, name, role, unitIds, senior };
}

/** The units of a person by name, for pages and for `GET /api/me`. */
export async function unitsOf(reader: Reader, userId: string): Promise<UnitOfPerson[]> {
	return reader
		.select({ id: units.id, name: units.name, kind: units.kind })
		.from(userUnits)
		.innerJoin(units, eq(units.id, userUnits.unitId))
		.where(eq(userUnits.userId, userId))
		.orderBy(units.name);
}

/** The person of a program's `Authorization: Bearer` token, or null. */
export async function personOfToken(token: string): Promise<Person | null> {
	const [row] = await db()
		.select({ userId: personalTokens.userId })
		.from(personalTokens)
		.where(and(eq(personalTokens.tokenHash, digestSecret(token)), isNull(personalTokens.revokedAt)));
	return row ? loadPerson(db(), row.userId) : null;
}
