/** What is on record of each try: one row for each, never changed. */
import { and, asc, count, eq, gte, inArray, max, min } from 'drizzle-orm';
import type { Outcome } from '$lib/domain/messages/outcome';
import { db, type Tx } from '../db';
import { outboxAttempts, outboxResends } from '../db/schema';
import { newId } from '../ids';
import type { OutboxRow } from './change';

export interface Attempt {
	startedAt: number;
	endedAt: number;
	outcome: Outcome;
	/** See the channel's `Sent`; `looked-up`, `not-looked-up` and `interrupted` are ours. */
	code: string | null;
}

/** How the attempts of a message ended so far, oldest first. */
export async function attemptsOf(messageId: string) {
	return db()
		.select()
		.from(outboxAttempts)
		.where(eq(outboxAttempts.messageId, messageId))
		.orderBy(asc(outboxAttempts.number));
}

export async function addAttempt(tx: Tx, row: OutboxRow, attempt: Attempt): Promise<number> {
	const number = (await tx.$count(outboxAttempts, eq(outboxAttempts.messageId, row.id))) + 1;
	const { startedAt, endedAt, outcome, code } = attempt;
	await tx.insert(outboxAttempts).values({
		id: newId(),
		messageId: row.id,
		number,
		startedAt,
		endedAt,
		outcome: outcome.kind,
		code,
		providerId: outcome.kind === 'accepted' ? outcome.id : null
	});
	return number;
}

/** The attempt of a worker that was killed: whether the message went out, nobody knows. */
export function interrupted(startedAt: number, endedAt: number): Attempt {
	return { startedAt, endedAt, outcome: { kind: 'unknown', reason: 'no-answer' }, code: 'interrupted' };
}

/** How many attempts count, and when the first of them began: those since a person last had it sent again. */
export async function startOfSchedule(
	tx: Tx,
	messageId: string
): Promise<{ attempts: number; firstAt: number | null }> {
	const [resent] = await tx
		.select({ at: max(outboxResends.at) })
		.from(outboxResends)
		.where(eq(outboxResends.messageId, messageId));
	const [counted] = await tx
		.select({ attempts: count(), firstAt: min(outboxAttempts.startedAt) })
		.from(outboxAttempts)
		.where(and(eq(outboxAttempts.messageId, messageId), gte(outboxAttempts.startedAt, resent?.at ?? 0)));
	return counted ?? { attempts: 0, firstAt: null };
}

/** Which of these identifiers of the gateway belong to messages that we know of. */
export async function knownProviderIds(ids: string[]): Promise<Set<string>> {
	if (ids.length === 0) {
		return new Set();
	}
	const rows = await db()
		.select({ id: outboxAttempts.providerId })
		.from(outboxAttempts)
		.where(inArray(outboxAttempts.providerId, ids));
	return new Set(rows.flatMap(({ id }) => (id === null ? [] : [id])));
}
