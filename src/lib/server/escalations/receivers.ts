import { and, asc, eq, gt, inArray, isNull, lte, ne } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { ROLES } from '$lib/domain/core/codes';
import type { Receiver } from '$lib/domain/escalations/views';
import { accessEscalation } from '../access/access';
import type { PersonContext } from '../context';
import { db, type Reader } from '../db';
import { coverShifts, users, userUnits } from '../db/schema';

/**
 * To whom this person could pass an escalation on: the others of the patient's unit whose role may take one, those
 * on cover first. Empty for somebody who could not hold it themselves.
 */
export async function receiversOf({ actor, now }: PersonContext, escalationId: string): Promise<Receiver[]> {
	const { episode } = await accessEscalation(db(), actor, escalationId, 'escalation.read');
	const { unitId } = episode;
	if (!can(actor, 'escalation.take', { unitId })) {
		return [];
	}
	return takersOf({ actor, now }, unitId);
}

/** Everybody else of a unit whose role may take an escalation, those on cover first. */
export async function takersOf(
	{ actor, now }: Pick<PersonContext, 'actor' | 'now'>,
	unitId: string
): Promise<Receiver[]> {
	const [people, onCover] = await Promise.all([takers(db(), actor, unitId), posts(db(), unitId, now)]);
	const all = people.map((person) => ({ ...person, post: onCover.get(person.id) ?? null }));
	return [...all.filter(({ post }) => post !== null), ...all.filter(({ post }) => post === null)];
}

/** The roles that take escalations, by the one place that decides it. */
const TAKING_ROLES = ROLES.filter((role) =>
	can({ kind: 'person', id: '', name: '', role, unitIds: [] }, 'escalation.take')
);

function takers(reader: Reader, actor: Person, unitId: string) {
	return reader
		.select({ id: users.id, name: users.name, role: users.role })
		.from(users)
		.innerJoin(userUnits, eq(userUnits.userId, users.id))
		.where(
			and(
				eq(userUnits.unitId, unitId),
				inArray(users.role, TAKING_ROLES),
				isNull(users.disabledAt),
				ne(users.id, actor.id)
			)
		)
		.orderBy(asc(users.name));
}

async function posts(reader: Reader, unitId: string, at: number) {
	const rows = await reader
		.select({ userId: coverShifts.userId, post: coverShifts.post })
		.from(coverShifts)
		.where(and(eq(coverShifts.unitId, unitId), lte(coverShifts.startsAt, at), gt(coverShifts.endsAt, at)));
	return new Map(rows.map(({ userId, post }) => [userId, post]));
}
