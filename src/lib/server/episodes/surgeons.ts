import { and, asc, eq, inArray, isNull } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { db } from '../db';
import { users, userUnits } from '../db/schema';

/** The surgeons whom a person may name: those of their own units, by name. */
export async function surgeonsFor(person: Person): Promise<{ id: string; name: string }[]> {
	return db()
		.selectDistinct({ id: users.id, name: users.name })
		.from(users)
		.innerJoin(userUnits, eq(userUnits.userId, users.id))
		.where(
			and(eq(users.role, 'surgeon'), isNull(users.disabledAt), inArray(userUnits.unitId, [...person.unitIds]))
		)
		.orderBy(asc(users.name));
}
