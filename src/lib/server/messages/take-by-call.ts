import { and, eq } from 'drizzle-orm';
import type { AuditEvent } from '$lib/domain/audit/actions';
import { STAFF_CALLS } from '$lib/domain/messages/templates';
import { loadPerson } from '../auth/people';
import type { Context, PersonContext } from '../context';
import { db, type Reader, type Tx } from '../db';
import { inboundMessages, outbox, users } from '../db/schema';
import { env } from '../env';
import { newId } from '../ids';
import { VOICE_PATH } from '../outbox/channels';
import { digitAddress } from '../outbox/channels/voice';
import type { OutboxRow } from '../outbox/change';
import { write, type Change } from '../write';
import { askedForDigit, spoken } from './markup';
import { requiredField, type GatewayForm } from './signature';
import { placeFields, tryTake, whatStands, type Tried } from './try-take';

const TAKE_DIGIT = '1';
const NOT_TAKEN = STAFF_CALLS['not-taken'].en({});

/**
 * A digit that somebody pressed whom a call for help was telephoned to. Who they are follows from the message; the
 * number must still be theirs. The digit counts once for each call of the gateway's: posted again it takes nothing.
 * @returns the markup that the caller hears
 */
export async function takeByCall(form: GatewayForm, messageId: string, request: Context): Promise<string> {
	const callId = requiredField(form, 'CallSid');
	const row = await calledMessage(messageId, requiredField(form, 'To'));
	const person = row?.userId ? await loadPerson(db(), row.userId) : null;
	if (!row || !person) {
		return spoken(NOT_TAKEN);
	}
	if (form.get('Digits') !== TAKE_DIGIT) {
		return askedForDigit(row.body, digitAddress(env().publicUrl + VOICE_PATH, messageId));
	}
	const context: PersonContext = { ...request, actor: person, key: null };
	return spoken(await onTakeDigit(context, row, callId));
}

/** @returns what the caller hears */
async function onTakeDigit(context: PersonContext, row: OutboxRow, callId: string): Promise<string> {
	try {
		const { result } = await write(context, 'anyone', async (tx) => {
			const inboundId = await keepDigit(tx, context, row, callId);
			const tried = await tryTake(tx, context, row.refId, 'call');
			return noted(tried, inboundId, await wordsOf(tx, tried));
		});
		return result;
	} catch (error) {
		if (!(error instanceof AlreadyPressed)) {
			throw error;
		}
		return wordsOf(db(), await whatStands(db(), context, row.refId));
	}
}

/** Thrown inside the transaction to leave no trace of a digit that was posted before. */
class AlreadyPressed extends Error {}

/** The digit stands among what came in, once for each call of the gateway's. */
async function keepDigit(
	tx: Tx,
	{ actor, now }: PersonContext,
	row: OutboxRow,
	callId: string
): Promise<string> {
	if ((await tx.$count(inboundMessages, eq(inboundMessages.providerId, callId))) > 0) {
		throw new AlreadyPressed();
	}
	const [user] = await tx.select({ phone: users.phone }).from(users).where(eq(users.id, actor.id));
	const id = newId();
	await tx.insert(inboundMessages).values({
		id,
		providerId: callId,
		fromNumber: user?.phone ?? '',
		body: TAKE_DIGIT,
		at: now,
		userId: row.userId,
		understoodAs: 'take',
		handledAt: now
	});
	return id;
}

function noted(tried: Tried, inboundId: string, result: string): Change<string> {
	const change = tried.kind === 'yours' ? tried.change : null;
	const received: AuditEvent = {
		action: 'message.received',
		objectKind: 'inbound',
		objectId: inboundId,
		episodeId: 'escalation' in tried ? tried.escalation.episodeId : null,
		detail: { understoodAs: 'take', handled: true }
	};
	return { ...change, result, audit: [received, ...[change?.audit ?? []].flat()] };
}

/** What somebody who pressed the digit hears. */
async function wordsOf(reader: Reader, tried: Tried): Promise<string> {
	if (tried.kind === 'not-allowed' || tried.kind === 'unseen') {
		return NOT_TAKEN;
	}
	const place = await placeFields(reader, tried.escalation);
	switch (tried.kind) {
		case 'yours':
			return STAFF_CALLS.yours.en(place);
		case 'held':
			return STAFF_CALLS['taken-before'].en({ ...place, since: tried.since, holder: tried.holder });
		case 'over':
			return STAFF_CALLS['over-before'].en({ ...place, since: tried.since });
	}
}

/** The telephoned message, if it was to this number; null for any other. */
async function calledMessage(id: string, number: string): Promise<OutboxRow | null> {
	const [row] = await db()
		.select({ message: outbox })
		.from(outbox)
		.innerJoin(users, eq(users.id, outbox.userId))
		.where(
			and(
				eq(outbox.id, id),
				eq(outbox.channel, 'voice'),
				eq(outbox.refKind, 'escalation'),
				eq(users.phone, number)
			)
		);
	return row?.message ?? null;
}
