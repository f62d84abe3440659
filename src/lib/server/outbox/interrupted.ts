/** What a worker that was killed has left behind. */
import { and, eq, ne } from 'drizzle-orm';
import { db } from '../db';
import { outbox } from '../db/schema';
import { addAttempt, interrupted } from './attempts';
import { changing, messageEvent, type OutboxRow } from './change';
import { claimedAt } from './claim';

/** The attempt of a worker that never told how it ended: nobody knows whether it went through. */
export async function recordInterrupted(row: OutboxRow, startedAt: number, now: number): Promise<void> {
	await changing(now, async (tx) => {
		const attempts = await addAttempt(tx, row, interrupted(startedAt, now));
		await tx.update(outbox).set({ attempts }).where(eq(outbox.id, row.id));
	});
}

/**
 * End the leases of all other workers at once. One process owns the database and has one worker, so whoever else
 * claimed a message was killed with the process before. Each of their attempts is put on record as unknown, which
 * makes the next one ask the gateway first, and what was being sent is due now and not after its lease.
 * @param owner the worker that starts
 * @returns how many messages were taken back
 */
export async function takeBackForeign(owner: string, now: number): Promise<number> {
	const foreign = and(eq(outbox.state, 'sending'), ne(outbox.leaseOwner, owner));
	if ((await db().$count(outbox, foreign)) === 0) {
		return 0;
	}
	return changing(now, async (tx, events) => {
		const left = await tx.select().from(outbox).where(foreign);
		for (const row of left) {
			const attempts = await addAttempt(tx, row, interrupted(claimedAt(row, now), now));
			await tx
				.update(outbox)
				.set({ attempts, state: 'ready', nextAt: now, leaseOwner: null, leaseUntil: null })
				.where(eq(outbox.id, row.id));
			events.push(await messageEvent(tx, row, 'ready'));
		}
		return left.length;
	});
}
