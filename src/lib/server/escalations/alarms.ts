import { and, asc, eq, inArray, isNotNull, or } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { toRfc3339 } from '$lib/domain/core/instant';
import { GRADES } from '$lib/domain/core/codes';
import { isChainSpent, isOverEveryScreen } from '$lib/domain/escalations/chain';
import type { Alarm } from '$lib/domain/escalations/views';
import type { Reader } from '../db';
import { episodes, escalations, units } from '../db/schema';

/**
 * The escalations of a person's units that nobody has, or whose holder does not come, graver and older first: the high ones,
 * and of any grade those about which everybody was told. Every screen of the unit shows them, whatever the role:
 * unit, bed, grade and time, as a text message carries them.
 */
export async function alarmsOf(db: Reader, person: Person): Promise<Alarm[]> {
	const rows = await db
		.select({ e: escalations, unitId: units.id, unit: units.name, bed: episodes.bed })
		.from(escalations)
		.innerJoin(episodes, eq(episodes.id, escalations.episodeId))
		.innerJoin(units, eq(units.id, episodes.unitId))
		.where(
			and(
				or(
					eq(escalations.state, 'raised'),
					and(eq(escalations.state, 'taken'), isNotNull(escalations.nextStepAt))
				),
				inArray(episodes.unitId, [...person.unitIds])
			)
		)
		.orderBy(asc(escalations.raisedAt), asc(escalations.id));
	return rows
		.filter(({ e, unitId }) => isOverEveryScreen(e) && can(person, 'alarm.read', { unitId }))
		.toSorted((a, b) => GRADES.indexOf(a.e.grade) - GRADES.indexOf(b.e.grade))
		.map(({ e, ...place }) => ({
			id: e.id,
			...place,
			grade: e.grade,
			raisedAt: toRfc3339(e.raisedAt),
			taken: e.state === 'taken',
			chainSpent: e.nextStep !== null && isChainSpent(e.grade, e.nextStep)
		}));
}
