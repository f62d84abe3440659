import { desc, eq } from 'drizzle-orm';
import type { LiveEvent } from '$lib/domain/live/events';
import { transact, type Reader, type Tx } from '../db';
import { episodes, escalations, referrals, visits, type outbox } from '../db/schema';
import { publish } from '../live/hub';
import { appendLive } from '../live/log';

export type OutboxRow = typeof outbox.$inferSelect;
export type MessageState = OutboxRow['state'];

/**
 * One transaction over messages alone: what the work pushes to `events` is logged with it and published after the
 * commit. What becomes of a message is on record in its attempts; the audit gets a row when it fails. This goes past
 * `write()` on purpose: docs/ARCHITECTURE.md names all that does.
 */
export async function changing<T>(at: number, work: (tx: Tx, events: LiveEvent[]) => Promise<T>): Promise<T> {
	const { result, logged } = await transact(async (tx) => {
		const events: LiveEvent[] = [];
		const result = await work(tx, events);
		return { result, logged: await appendLive(tx, at, events) };
	});
	publish(logged);
	return result;
}

/** The event that a message has a new state; it belongs to the patient that its cause is about. */
export async function messageEvent(
	reader: Reader,
	row: Pick<OutboxRow, 'id' | 'refKind' | 'refId' | 'patientId'>,
	state: MessageState
): Promise<LiveEvent> {
	return { topic: 'message', kind: state, id: row.id, episodeId: await episodeOfMessage(reader, row) };
}

/** The episode that a message is about; null for one that is about none. */
export async function episodeOfMessage(
	reader: Reader,
	{ refKind, refId, patientId }: Pick<OutboxRow, 'refKind' | 'refId' | 'patientId'>
): Promise<string | null> {
	switch (refKind) {
		case 'escalation':
		case 'visit':
		case 'referral': {
			const table = { escalation: escalations, visit: visits, referral: referrals }[refKind];
			const [row] = await reader
				.select({ episodeId: table.episodeId })
				.from(table)
				.where(eq(table.id, refId));
			return row?.episodeId ?? null;
		}
		case 'episode':
		case 'page':
			return refId;
		case 'inbound':
			return patientId === null ? null : newestEpisode(reader, patientId);
		case 'account':
			return null;
	}
}

/** The patient's newest episode: what a text of theirs is filed under. */
export async function newestEpisode(reader: Reader, patientId: string): Promise<string | null> {
	const [row] = await reader
		.select({ id: episodes.id })
		.from(episodes)
		.where(eq(episodes.patientId, patientId))
		.orderBy(desc(episodes.createdAt), desc(episodes.id))
		.limit(1);
	return row?.id ?? null;
}
