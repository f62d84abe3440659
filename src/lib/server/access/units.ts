import { and, asc, eq, or } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { invalidField } from '$lib/domain/core/errors';
import type { UnitOfPerson } from '../auth/people';
import { db, type Reader } from '../db';
import { units, users } from '../db/schema';

/**
 * A unit by id or exact name, among those of the person.
 * @throws Problem `invalid` naming the field and the value
 */
export async function resolveUnit(db: Reader, person: Person, idOrName: string, pointer: string) {
	const unit = await findUnit(db, idOrName);
	if (!unit || !person.unitIds.includes(unit.id)) {
		throw invalidField(pointer, `There is no unit "${idOrName}" among yours.`);
	}
	return unit;
}

/**
 * A unit by id or exact name, among all of the hospital: somebody may say where their patient went without
 * belonging there.
 * @throws Problem `invalid` naming the field and the value
 */
export async function resolveAnyUnit(db: Reader, idOrName: string, pointer: string) {
	const unit = await findUnit(db, idOrName);
	if (!unit) {
		throw invalidField(pointer, `There is no unit "${idOrName}".`);
	}
	return unit;
}

/** Every unit of the hospital by name: where a patient can be moved to. */
export function allUnits(): Promise<UnitOfPerson[]> {
	return db()
		.select({ id: units.id, name: units.name, kind: units.kind })
		.from(units)
		.orderBy(asc(units.name));
}

async function findUnit(db: Reader, idOrName: string) {
	const [unit] = await db
		.select()
		.from(units)
		.where(or(eq(units.id, idOrName), eq(units.name, idOrName)));
	return unit ?? null;
}

/**
 * A surgeon by id or exact name. Somebody whose account is disabled operates here no longer, and a name that two
 * of them bear names neither.
 * @throws Problem `invalid` naming the field and the value
 */
export async function resolveSurgeon(db: Reader, idOrName: string, pointer: string): Promise<string> {
	const named = await db
		.select({ id: users.id, disabledAt: users.disabledAt })
		.from(users)
		.where(and(eq(users.role, 'surgeon'), or(eq(users.id, idOrName), eq(users.name, idOrName))));
	const active = named.filter(({ disabledAt }) => disabledAt === null);
	const [surgeon, another] = active;
	if (another) {
		throw invalidField(
			pointer,
			`${active.length} surgeons are called "${idOrName}": name one by identifier.`
		);
	}
	if (!surgeon) {
		const why = named.length > 0 ? 'their account is disabled' : 'nobody of that name or identifier';
		throw invalidField(pointer, `There is no surgeon "${idOrName}": ${why}.`);
	}
	return surgeon.id;
}
