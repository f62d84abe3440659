import { sql, type SQL } from 'drizzle-orm';
import { addDays, instantOf, localDateOf } from '$lib/domain/core/time';
import { REVIEW_AGAIN_DAYS, STERNAL_DAYS } from '$lib/domain/episodes/precautions';
import { env } from '../env';
import { PLACE } from './place';

const DAY_MS = 24 * 60 * 60 * 1000;

/**
 * Sternal precautions never end by the calendar: from the day on which their end falls due it waits on the surgeon,
 * and again a while after a decision that did not end them. An ask that is open stands for itself.
 */
export function precautionsDue(now: number): SQL {
	const { zone } = env().hospital;
	const today = localDateOf(now, zone);
	const midnight = instantOf(today, '00:00', zone);
	const operatedBefore = instantOf(addDays(today, 1 - STERNAL_DAYS), '00:00', zone);
	// The first instant of the day on which it fell due, counted back from today's in whole days.
	const dayOld = sql`cast(${midnight - (STERNAL_DAYS - 1) * DAY_MS - 1} - o.operated_at as integer)`;
	const since = sql`cast(${midnight} - ${dayOld} / cast(${DAY_MS} as integer) * ${DAY_MS} as integer)`;
	return sql`
		select 'precautions-due', e.id, ${PLACE}, null, null, 'precautions-end', null, null, null,
			null, null, ${since}, ${since}, null
		from operations o
		join episodes e on e.id = o.episode_id
		join place on place.id = e.id
		where e.closed_at is null and o.approach = 'sternotomy' and o.operated_at < ${operatedBefore}
			and not exists (
				select 1 from operations later
				where later.episode_id = o.episode_id and later.operated_at <= ${now}
					and (later.operated_at, later.id) > (o.operated_at, o.id)
			)
			and not exists (
				select 1 from clearances c
				where c.episode_id = e.id and c.kind = 'precautions-end'
					and (c.operation_id is null or c.operation_id = o.id)
					and (
						c.state = 'asked'
						or (c.state in ('given', 'given-with-limits') and (c.review_on is null or c.review_on >= ${today}))
						or (c.state in ('withheld', 'on-hold', 'withdrawn') and c.decided_by is not null
							and c.decided_at > ${now - REVIEW_AGAIN_DAYS * DAY_MS})
					)
			)`;
}
