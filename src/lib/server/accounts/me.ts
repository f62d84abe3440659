import { eq } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { can, PERMISSIONS, type Permission } from '$lib/domain/access/can';
import type { Role } from '$lib/domain/core/codes';
import { unitsOf, type UnitOfPerson } from '../auth/people';
import { db } from '../db';
import { users } from '../db/schema';

export interface Me {
	user: { id: string; name: string; email: string; role: Role; units: UnitOfPerson[] };
	units: UnitOfPerson[];
	permissions: Permission[];
}

/** The person who is signed in, their units and what their role may do there. */
export async function meOf(person: Person): Promise<Me> {
	const [units, [user]] = await Promise.all([
		unitsOf(db(), person.id),
		db().select({ email: users.email }).from(users).where(eq(users.id, person.id))
	]);
	const { id, name, role } = person;
	return {
		user: { id, name, email: user?.email ?? '', role, units },
		units,
		permissions: PERMISSIONS.filter((permission) => can(person, permission))
	};
}
