import { and, asc, eq, inArray, isNotNull, or } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { toRfc3339 } from '$lib/domain/core/instant';
import { isChainSpent } from '$lib/domain/escalations/chain';
import type { Alarm } from '$lib/domain/escalations/views';
import type { Reader } from '../db';
import { episodes, escalations, units } from '../db/schema';

/**
 * The high escalations of a person's units that nobody has, or whose holder does not come, oldest first: what
 * every screen of the unit shows, whatever the role. Unit, bed, grade and time, as a text message carries them.
 */
export async function alarmsOf(db: Reader, person: Person): Promise<Alarm[]> {
	const rows = await db
		.select({ e: escalations, unitId: units.id, unit: units.name, bed: episodes.bed })
		.from(escalations)
		.innerJoin(episodes, eq(episodes.id, escalations.episodeId))
		.innerJoin(units, eq(units.id, episodes.unitId))
		.where(
			and(
				eq(escalations.grade, 'high'),
				or(
					eq(escalations.state, 'raised'),
					and(eq(escalations.state, 'taken'), isNotNull(escalations.nextStepAt))
				),
				inArray(episodes.unitId, [...person.unitIds])
			)
		)
		.orderBy(asc(escalations.raisedAt), asc(escalations.id));
	return rows
		.filter(({ unitId }) => can(person, 'alarm.read', { unitId }))
		.map(({ e, ...place }) => ({
			id: e.id,
			...place,
			grade: e.grade,
			raisedAt: toRfc3339(e.raisedAt),
			taken: e.state === 'taken',
			chainSpent: e.nextStep !== null && isChainSpent(e.grade, e.nextStep)
		}));
}
