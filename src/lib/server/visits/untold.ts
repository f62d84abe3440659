/**
 * Visits that staff cancelled or moved, and whose patient has not heard of it: they would stand before a closed door.
 * Derived from what went through since the change, because news may be skipped, fail, expire, or never be written.
 */
import { eq, sql, type SQL } from 'drizzle-orm';
import { HOUR } from '$lib/domain/core/time';
import { PLACE } from '../loose-ends/place';
import type { Reader } from '../db';
import { visits } from '../db/schema';

type VisitRow = typeof visits.$inferSelect;

/** So long after the time that the patient knew of it is still said: who came in vain wants a call. Common practice, no published source. */
export const UNTOLD_AFTER_MS = 24 * HOUR;

/** What tells the patient of the newest change of the visit `v`: its news, one text about all visits, or a reminder. */
const TELLS = sql`m.created_at >= v.changed_at and m.kind in ('visit', 'reminder') and (
	(m.ref_kind = 'visit' and m.ref_id = v.id)
	or (m.ref_kind = 'episode' and m.ref_id = v.episode_id and m.cause_key like 'visits-cancelled:' || v.id || ':%')
)`;

/** True in SQL where the patient of the visit `v` has heard of its change, or a person has told them. */
const HAS_HEARD = sql`(v.told_at is not null or exists (
	select 1 from outbox m where ${TELLS} and m.state in ('accepted', 'delivered')
))`;

/** The branch of the open things; news that may still go in time are waited for. */
export function visitsUntold(now: number): SQL {
	return sql`
		select 'visit-untold', v.id, ${PLACE}, null, null, v.state, null, null, null,
			null, null, v.changed_at, v.changed_from, null
		from visits v
		join place on place.id = v.episode_id
		where v.changed_at is not null and v.state in ('planned', 'cancelled')
			and v.changed_from > ${now - UNTOLD_AFTER_MS} and not ${HAS_HEARD}
			and not exists (
				select 1 from outbox m where ${TELLS} and m.kind = 'visit' and m.state in ('ready', 'sending')
					and m.expires_at > ${now}
			)`;
}

/** True in SQL for a message `m` whose visit stands among these things itself: it is one thing to see to. */
export const IS_NEWS_OF_CHANGE = sql`(m.kind = 'visit' and exists (
	select 1 from visits c
	where c.id = case m.ref_kind when 'visit' then m.ref_id else substr(m.cause_key, length('visits-cancelled:') + 1, 36) end
		and c.changed_at is not null and m.created_at >= c.changed_at
))`;

/** When the patient expects the visit to be: where they have not heard of the last change, before that. */
export async function startKnown(reader: Reader, { id, startsAt }: VisitRow): Promise<number> {
	const rows = await reader.all<{ at: number }>(sql`
		select v.changed_from as at from visits v
		where v.id = ${id} and v.changed_at is not null and not ${HAS_HEARD}`);
	return rows[0]?.at ?? startsAt;
}

/** What is kept of a change that the patient has to hear of. */
export function toBeTold(now: number, from: number) {
	return { changedAt: now, changedFrom: from, toldAt: null, toldBy: null };
}

/** Nothing of the visit has to be told any more. */
export const NOTHING_TO_TELL = { changedAt: null, changedFrom: null, toldAt: null, toldBy: null };

/** Whether the patient of a visit still has to hear of its change from a person. */
export async function isUntold(reader: Reader, id: string): Promise<boolean> {
	const [visit] = await reader.select().from(visits).where(eq(visits.id, id));
	if (visit?.state !== 'planned' && visit?.state !== 'cancelled') {
		return false;
	}
	const rows = await reader.all(sql`
		select 1 from visits v where v.id = ${id} and v.changed_at is not null and not ${HAS_HEARD}`);
	return rows.length > 0;
}
