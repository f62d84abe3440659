import { and, asc, count, eq, gte, inArray, isNull, max, min, ne } from 'drizzle-orm';
import type { LiveEvent } from '$lib/domain/live/events';
import type { Outcome } from '$lib/domain/messages/outcome';
import { appendAudit } from '../audit/append';
import { db, type Tx } from '../db';
import { outbox, outboxAttempts, outboxResends, patients } from '../db/schema';
import { seekOtherWay } from '../escalations/next-channel';
import { newId } from '../ids';
import { stateByStatus } from '../messages/delivery';
import { claimedAt } from './claim';
import { changing, episodeOfMessage, messageEvent, type OutboxRow } from './change';
import { nextState } from './next-state';
import type { SkipReason } from './verdict';

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

/**
 * Put an attempt on record and give the message its next state. Should the lease have ended meanwhile and another
 * worker have the message, the attempt is recorded all the same and the state is theirs to decide.
 */
export async function recordAttempt(
	row: OutboxRow,
	owner: string,
	attempt: Attempt,
	random: number
): Promise<void> {
	await changing(attempt.endedAt, async (tx, events) => {
		const number = await addAttempt(tx, row, attempt);
		const since = await startOfSchedule(tx, row.id);
		const next = nextState(row, attempt.outcome, {
			attempts: since.attempts,
			firstAt: since.firstAt ?? attempt.startedAt,
			now: attempt.endedAt,
			random
		});
		const told = next.providerId === undefined ? null : await stateByStatus(tx, next.providerId);
		const mine = await settleRow(tx, events, row, owner, attempt.endedAt, {
			attempts: number,
			state: told?.state ?? next.state,
			stateReason: told?.reason ?? next.reason,
			nextAt: next.nextAt ?? row.nextAt,
			sentAt: next.state === 'accepted' ? attempt.endedAt : null,
			providerId: next.providerId ?? null
		});
		await noteOptOut(tx, row, attempt);
		if (mine && (next.state === 'failed' || told?.state === 'undelivered')) {
			await seekOtherWay(tx, row, 'failed', attempt.endedAt);
		} else if (mine && attempt.outcome.kind === 'unknown') {
			await seekOtherWay(tx, row, 'unknown', attempt.endedAt);
		}
	});
}

/** How many attempts count, and when the first of them began: those since a person last had it sent again. */
async function startOfSchedule(
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

function interrupted(startedAt: number, endedAt: number): Attempt {
	return { startedAt, endedAt, outcome: { kind: 'unknown', reason: 'no-answer' }, code: 'interrupted' };
}

/** Why a person cannot be reached at all, on any channel. */
const OUT_OF_REACH: ReadonlySet<string> = new Set<SkipReason>([
	'account disabled',
	'no telephone number',
	'nobody to send to'
]);

/** Give a claimed message back or end it, without an attempt: it waits, is not wanted any more, or came too late. */
export async function releaseRow(
	row: OutboxRow,
	owner: string,
	now: number,
	change: { state: 'ready' | 'skipped' | 'failed'; reason: string | null; nextAt?: number }
): Promise<void> {
	await changing(now, async (tx, events) => {
		const { state, reason, nextAt = row.nextAt } = change;
		const mine = await settleRow(tx, events, row, owner, now, { state, stateReason: reason, nextAt });
		if (mine && reason !== null && OUT_OF_REACH.has(reason)) {
			await seekOtherWay(tx, row, 'failed', now);
		}
	});
}

async function addAttempt(tx: Tx, row: OutboxRow, attempt: Attempt): Promise<number> {
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

type Change = Partial<OutboxRow> & Pick<OutboxRow, 'state'>;

/**
 * The one place where a claimed message leaves its worker. What did not arrive is on record in the audit too.
 * @returns false where another worker has it by now
 */
async function settleRow(
	tx: Tx,
	events: LiveEvent[],
	row: OutboxRow,
	owner: string,
	now: number,
	change: Change
): Promise<boolean> {
	const mine = and(eq(outbox.id, row.id), eq(outbox.leaseOwner, owner), eq(outbox.state, 'sending'));
	const [settled] = await tx
		.update(outbox)
		.set({ ...change, leaseOwner: null, leaseUntil: null })
		.where(mine)
		.returning({ id: outbox.id });
	if (!settled) {
		return false;
	}
	events.push(await messageEvent(tx, row, change.state));
	if (change.state === 'failed' || change.state === 'undelivered') {
		await auditFailure(tx, row, now, change.stateReason ?? null);
	}
	return true;
}

/** That a message did not arrive, by whom it was sent and why; its text and its address are not on record here. */
export async function auditFailure(
	tx: Tx,
	row: Pick<OutboxRow, 'id' | 'kind' | 'channel' | 'refKind' | 'refId' | 'patientId'>,
	now: number,
	reason: string | null
): Promise<void> {
	const actor = { kind: 'system', id: row.kind === 'escalation' ? 'chain' : 'reminders' } as const;
	await appendAudit(tx, { actor, address: null, now }, [
		{
			action: 'message.failed',
			objectKind: 'message',
			objectId: row.id,
			episodeId: await episodeOfMessage(tx, row),
			detail: { kind: row.kind, channel: row.channel, reason }
		}
	]);
}

/** The gateway knows of a STOP that we have not heard of: from now on we keep to it ourselves. */
async function noteOptOut(tx: Tx, row: OutboxRow, { outcome, endedAt }: Attempt): Promise<void> {
	if (row.patientId !== null && outcome.kind === 'permanent' && outcome.reason === 'opted-out') {
		await tx
			.update(patients)
			.set({ smsOptedOutAt: endedAt })
			.where(and(eq(patients.id, row.patientId), isNull(patients.smsOptedOutAt)));
	}
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
