import { and, eq } from 'drizzle-orm';
import type { LiveEvent } from '$lib/domain/live/events';
import { appendAudit } from '../audit/append';
import type { Tx } from '../db';
import { outbox } from '../db/schema';
import { episodeOfMessage, messageEvent, type OutboxRow } from './change';

type Change = Partial<OutboxRow> & Pick<OutboxRow, 'state'>;

/**
 * The one place where a claimed message leaves its worker. What did not arrive is on record in the audit too.
 * @returns false where another worker has it by now
 */
export async function settleRow(
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
