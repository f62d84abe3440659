import { eq, or } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { invalidField } from '$lib/domain/core/errors';
import type { Reader } from '../db';
import { units, users } from '../db/schema';

/**
 * A unit by id or exact name, among those of the person.
 * @throws Problem `invalid` naming the field and the value
 */
export async function resolveUnit(db: Reader, person: Person, idOrName: string, pointer: string) {
	const [unit] = await db
		.select()
		.from(units)
		.where(or(eq(units.id, idOrName), eq(units.name, idOrName)));
	if (!unit || !person.unitIds.includes(unit.id)) {
		throw invalidField(pointer, `There is no unit "${idOrName}" among yours.`);
	}
	return unit;
}

/** A surgeon by id or exact name. */
export async function resolveSurgeon(db: Reader, idOrName: string, pointer: string) {
	const [surgeon] = await db
		.select({ id: users.id, role: users.role })
		.from(users)
		.where(or(eq(users.id, idOrName), eq(users.name, idOrName)));
	if (surgeon?.role !== 'surgeon') {
		throw invalidField(pointer, `There is no surgeon "${idOrName}".`);
	}
	return surgeon.id;
}
