import type { Person } from '$lib/domain/access/actor';
import { can, type Permission, type Subject } from '$lib/domain/access/can';
import { Problem } from '$lib/domain/core/errors';

/**
 * For what belongs to a role and to no row: a list, an empty form.
 * @throws Problem `not-allowed`
 */
export function requirePermission(person: Person, permission: Permission, subject: Subject = {}): void {
	if (!can(person, permission, subject)) {
		throw new Problem('not-allowed', `The role ${person.role} may not do that (${permission}).`);
	}
}
