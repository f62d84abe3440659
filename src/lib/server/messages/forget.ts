import { and, eq, inArray, isNotNull, lte, ne, or } from 'drizzle-orm';
import { HOUR } from '$lib/domain/core/time';
import { db } from '../db';
import { inboundMessages, outbox } from '../db/schema';
import { env } from '../env';

const DAY = 24 * HOUR;
/** So many in one round: other writers must not wait. */
const ROUND = 500;

/** It has ended: nothing waits to be sent, and nobody has to see to it any more. */
const ended = or(
	inArray(outbox.state, ['accepted', 'delivered', 'skipped', 'cancelled']),
	and(
		inArray(outbox.state, ['failed', 'undelivered']),
		or(
			isNotNull(outbox.handledAt),
			// These are no loose ends of anybody: an invitation is sent anew, what went beside or after a text has that text.
			eq(outbox.kind, 'notice'),
			eq(outbox.refKind, 'account'),
			inArray(outbox.channel, ['voice', 'push']),
			and(eq(outbox.kind, 'escalation'), eq(outbox.channel, 'mail'))
		)
	)
);

/**
 * Remove what messages said, some time after their end: the log keeps that they were sent, how they fared and why. What
 * still waits to be seen to keeps its words.
 * @returns how many were emptied
 */
export async function forgetOldWords(now: number): Promise<number> {
	const { sentDays, receivedDays } = env().retention;
	return (await forgetSent(now - sentDays * DAY)) + (await forgetReceived(now - receivedDays * DAY));
}

/** `nextAt` is when it was last due. */
async function forgetSent(before: number): Promise<number> {
	const old = await db()
		.select({ id: outbox.id })
		.from(outbox)
		.where(and(ended, lte(outbox.nextAt, before), ne(outbox.body, '')))
		.limit(ROUND);
	const ids = old.map(({ id }) => id);
	if (ids.length > 0) {
		await db()
			.update(outbox)
			.set({ body: '', subject: null, calendar: null, address: null })
			.where(and(inArray(outbox.id, ids), ended));
	}
	return ids.length;
}

async function forgetReceived(before: number): Promise<number> {
	const old = await db()
		.select({ id: inboundMessages.id })
		.from(inboundMessages)
		.where(
			and(lte(inboundMessages.at, before), isNotNull(inboundMessages.handledAt), ne(inboundMessages.body, ''))
		)
		.limit(ROUND);
	const ids = old.map(({ id }) => id);
	if (ids.length > 0) {
		await db().update(inboundMessages).set({ body: '' }).where(inArray(inboundMessages.id, ids));
	}
	return ids.length;
}
