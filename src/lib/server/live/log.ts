import { and, asc, eq, gt, lt, sql } from 'drizzle-orm';
import type { LiveEvent } from '$lib/domain/live/events';
import { db as database, type Db, type Reader, type Tx } from '../db';
import { episodes, liveEvents } from '../db/schema';
import type { LoggedEvent } from './hub';

/** How long a client can be away and still resume without reloading. */
export const LIVE_HISTORY_MS = 24 * 60 * 60 * 1000;

/** Write events to the log inside the transaction that they announce; their ids are the stream's cursors. */
export async function appendLive(tx: Tx, at: number, events: LiveEvent[]): Promise<LoggedEvent[]> {
	const logged: LoggedEvent[] = [];
	for (const event of events) {
		const unitId = event.unitId ?? (await unitOf(tx, event.episodeId));
		const [row] = await tx
			.insert(liveEvents)
			.values({
				at,
				topic: event.topic,
				kind: event.kind,
				subjectId: event.id,
				episodeId: event.episodeId,
				unitId,
				userId: event.userId ?? null
			})
			.returning({ id: liveEvents.id });
		if (row) {
			logged.push({ ...event, cursor: row.id, unitId });
		}
	}
	return logged;
}

async function unitOf(tx: Tx, episodeId: string | null): Promise<string | null> {
	if (!episodeId) {
		return null;
	}
	const [row] = await tx.select({ unitId: episodes.unitId }).from(episodes).where(eq(episodes.id, episodeId));
	return row?.unitId ?? null;
}

/** The newest cursor, 0 for an empty log. It never goes back, even when old rows were removed. */
export async function currentCursor(db: Reader): Promise<number> {
	// `get` fails where there is no row, which is so until the first event was written.
	const [row] = await db.all<{ seq: number }>(
		sql`select seq from sqlite_sequence where name = 'live_events'`
	);
	return row?.seq ?? 0;
}

/** {@link currentCursor} of this process's database. */
export function liveCursor(): Promise<number> {
	return currentCursor(database());
}

/** True when every event after `cursor` is still in the log. */
export async function canResume(db: Reader, cursor: number): Promise<boolean> {
	const newest = await currentCursor(db);
	if (cursor > newest) {
		return false;
	}
	if (cursor === newest) {
		return true;
	}
	const [row] = await db
		.select({ id: liveEvents.id })
		.from(liveEvents)
		.where(eq(liveEvents.id, cursor + 1));
	return row !== undefined;
}

/** Events after `cursor`, oldest first, each with the unit that it concerned when it happened. */
export async function eventsAfter(db: Reader, cursor: number, limit = 500): Promise<LoggedEvent[]> {
	const rows = await db
		.select({
			cursor: liveEvents.id,
			topic: liveEvents.topic,
			kind: liveEvents.kind,
			id: liveEvents.subjectId,
			episodeId: liveEvents.episodeId,
			userId: liveEvents.userId,
			unitId: liveEvents.unitId
		})
		.from(liveEvents)
		.where(gt(liveEvents.id, cursor))
		.orderBy(asc(liveEvents.id))
		.limit(limit);
	return rows.map((row) => ({ ...row, topic: row.topic as LoggedEvent['topic'] }));
}

/** Remove what nobody can resume from any more, always from the old end. */
export async function forgetOldEvents(db: Db, now: number): Promise<void> {
	await db.delete(liveEvents).where(and(lt(liveEvents.at, now - LIVE_HISTORY_MS)));
}
