import { and, asc, eq, isNull } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { invalidField } from '$lib/domain/core/errors';
import type { Colleague } from '$lib/domain/referrals/views';
import { accessEpisode } from '../access/access';
import { loadPerson } from '../auth/people';
import type { Reader } from '../db';
import { users, userUnits } from '../db/schema';

/** Everybody to whom a question about the patient can be put, by name: those who may read the thread. */
export async function listColleagues(db: Reader, person: Person, episodeId: string): Promise<Colleague[]> {
	const { unitId } = await accessEpisode(db, person, episodeId, 'thread.read');
	const rows = await db
		.select({ id: users.id, name: users.name, role: users.role })
		.from(users)
		.innerJoin(userUnits, eq(userUnits.userId, users.id))
		.where(and(eq(userUnits.unitId, unitId), isNull(users.disabledAt)))
		.orderBy(asc(users.name), asc(users.id));
	return rows.filter(
		({ id, name, role }) =>
			id !== person.id && can({ kind: 'person', id, name, role, unitIds: [unitId] }, 'thread.read')
	);
}

/**
 * The people whom an entry asks, once each.
 * @throws Problem `invalid` naming the member that is nobody who could answer
 */
export async function askedPeople(
	db: Reader,
	asker: Person,
	unitId: string,
	ids: readonly string[]
): Promise<Person[]> {
	const people: Person[] = [];
	for (const [index, id] of ids.entries()) {
		const asked = await loadPerson(db, id);
		if (!asked || asked.id === asker.id || !can(asked, 'thread.read', { unitId })) {
			throw invalidField(
				`/mentions/${index}`,
				`mentions[${index}] ${id} is nobody else who sees this patient.`
			);
		}
		people.push(asked);
	}
	return people.filter(({ id }, index) => people.findIndex((other) => other.id === id) === index);
}
