import { and, eq, isNull } from 'drizzle-orm';
import type { Tx } from '../db';
import { patients } from '../db/schema';
import { seekOtherWay } from '../escalations/next-channel';
import { stateByStatus } from '../messages/delivery';
import { noteDevice } from '../push/fate';
import { addAttempt, startOfSchedule, type Attempt } from './attempts';
import { changing, type OutboxRow } from './change';
import { nextState } from './next-state';
import { settleRow } from './settle-row';
import type { SkipReason } from './verdict';

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
		await noteDevice(tx, row, attempt);
		if (mine && (next.state === 'failed' || told?.state === 'undelivered')) {
			await seekOtherWay(tx, row, 'failed', attempt.endedAt);
		} else if (mine && attempt.outcome.kind === 'unknown') {
			await seekOtherWay(tx, row, 'unknown', attempt.endedAt);
		}
	});
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

/** The gateway knows of a STOP that we have not heard of: from now on we keep to it ourselves. */
async function noteOptOut(tx: Tx, row: OutboxRow, { outcome, endedAt }: Attempt): Promise<void> {
	if (row.patientId !== null && outcome.kind === 'permanent' && outcome.reason === 'opted-out') {
		await tx
			.update(patients)
			.set({ smsOptedOutAt: endedAt })
			.where(and(eq(patients.id, row.patientId), isNull(patients.smsOptedOutAt)));
	}
}
