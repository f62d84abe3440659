import { and, eq, inArray } from 'drizzle-orm';
import type { LiveEvent } from '$lib/domain/live/events';
import { readStatus, type SmsStatus } from '$lib/domain/messages/status';
import type { Tx } from '../db';
import { outbox, smsStatuses } from '../db/schema';
import { seekOtherWay } from '../escalations/next-channel';
import { newId } from '../ids';
import { changing, messageEvent } from '../outbox/change';
import { auditFailure } from '../outbox/settle-row';
import { stateByStatus } from './delivery';
import { requiredField, type GatewayForm } from './signature';

/** How the gateway calls its fields. */
const OF_TEXT = { id: 'MessageSid', status: 'MessageStatus' };
export const OF_CALL = { id: 'CallSid', status: 'CallStatus' };

/**
 * Take in what the gateway tells about a message. The same status told again has no effect, a late one never moves
 * the message backwards, and one that comes before our own record of the sending is kept for it.
 */
export async function receiveStatus(form: GatewayForm, now: number, fields = OF_TEXT): Promise<void> {
	const providerId = requiredField(form, fields.id);
	const status = readStatus(requiredField(form, fields.status));
	if (status === null) {
		return;
	}
	await noteStatus(providerId, status, form.get('ErrorCode') ?? null, now);
}

/**
 * Keep a status that the gateway has told, asked or unasked, and move the message on by all of them.
 * @param errorCode the gateway's number of the error; anything else is left out
 */
export async function noteStatus(
	providerId: string,
	status: SmsStatus,
	errorCode: string | null,
	now: number
): Promise<void> {
	const known = /^\d{1,10}$/.exec(errorCode ?? '')?.[0] ?? null;
	await changing(now, async (tx, events) => {
		const [stored] = await tx
			.insert(smsStatuses)
			.values({ id: newId(), providerId, status, errorCode: known, at: now })
			.onConflictDoNothing()
			.returning({ id: smsStatuses.id });
		if (stored) {
			await moveOn(tx, events, providerId, now);
		}
	});
}

async function moveOn(tx: Tx, events: LiveEvent[], providerId: string, now: number): Promise<void> {
	const [row] = await tx
		.select()
		.from(outbox)
		.where(
			and(eq(outbox.providerId, providerId), inArray(outbox.state, ['accepted', 'delivered', 'undelivered']))
		);
	const told = await stateByStatus(tx, providerId);
	if (!row || !told || told.state === row.state) {
		return;
	}
	await tx.update(outbox).set({ state: told.state, stateReason: told.reason }).where(eq(outbox.id, row.id));
	events.push(await messageEvent(tx, row, told.state));
	if (told.state === 'undelivered') {
		await auditFailure(tx, row, now, told.reason);
		await seekOtherWay(tx, row, 'failed', now);
	}
}
