/** Branches of the open things that come of a visit's own day: its hour is near, its day is closed, or over. */
import { sql, type SQL } from 'drizzle-orm';
import { instantOf, localDateOf } from '$lib/domain/core/time';
import { UNCONFIRMED_WITHIN_MS } from '$lib/domain/visits/limits';
import { env } from '../env';
import { PLACE } from './place';

/** True in SQL where the visit `v` stands on a closed day. */
const ON_CLOSED_DAY = sql`exists (
	select 1 from closed_days d where d.date = v.local_date and d.removed_at is null
)`;

/**
 * A visit that nobody has confirmed by the evening before wants a telephone call, until it begins. One on a closed day
 * wants another time, and is told of with that.
 */
export function visitsUnconfirmed(now: number): SQL {
	return sql`
		select 'visit-unconfirmed', v.id, ${PLACE}, null, null, null, null, null, null,
			null, null, v.starts_at - ${UNCONFIRMED_WITHIN_MS}, v.starts_at, null
		from visits v
		join place on place.id = v.episode_id
		where v.state = 'planned' and v.starts_at > ${now} and v.starts_at <= ${now + UNCONFIRMED_WITHIN_MS}
			and not ${ON_CLOSED_DAY}`;
}

/** A visit whose day was closed after it was booked has to be moved or cancelled, or the day opened again. */
export function visitsOnClosedDays(now: number): SQL {
	return sql`
		select 'visit-closed-day', v.id, ${PLACE}, null, null, null, d.name, null, null,
			null, null, d.added_at, v.starts_at, null
		from visits v
		join place on place.id = v.episode_id
		join closed_days d on d.date = v.local_date and d.removed_at is null
		where v.state in ('planned', 'confirmed') and v.starts_at > ${now}`;
}

/** Whether a patient came is said on the day; a visit of an earlier one that nobody has marked is still owed that. */
export function visitsUnmarked(now: number): SQL {
	const { zone } = env().hospital;
	const midnight = instantOf(localDateOf(now, zone), '00:00', zone);
	return sql`
		select 'visit-unmarked', v.id, ${PLACE}, null, null, null, null, null, null,
			null, null, v.starts_at + v.minutes * 60000, v.starts_at, null
		from visits v
		join place on place.id = v.episode_id
		join episodes e on e.id = v.episode_id
		where v.state in ('planned', 'confirmed') and v.starts_at < ${midnight} and e.closed_at is null`;
}
