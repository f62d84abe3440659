import { and, eq, inArray } from 'drizzle-orm';
import type { LiveEvent } from '$lib/domain/live/events';
import type { Tx } from '../db';
import { outbox } from '../db/schema';
import { messageEvent } from './change';

/** Messages about the visit to its patient that nobody has begun to send. */
function waitingOf(visitId: string) {
	return and(
		eq(outbox.refKind, 'visit'),
		eq(outbox.refId, visitId),
		inArray(outbox.kind, ['reminder', 'visit']),
		inArray(outbox.state, ['ready', 'held'])
	);
}

/**
 * Drop reminders and news of a visit that is not as they tell any more, in the transaction that makes it so. One
 * that is being sent in this moment is checked again before a second attempt.
 */
export async function dropWaiting(tx: Tx, visitId: string, reason: string): Promise<LiveEvent[]> {
	const dropped = await tx
		.update(outbox)
		.set({ state: 'cancelled', stateReason: reason })
		.where(waitingOf(visitId))
		.returning();
	return Promise.all(dropped.map((row) => messageEvent(tx, row, 'cancelled')));
}
