import { and, eq, isNull } from 'drizzle-orm';
import type { Actor } from '$lib/domain/access/actor';
import type { AuditEvent } from '$lib/domain/audit/actions';
import type { LiveEvent } from '$lib/domain/live/events';
import { readPatientReply } from '$lib/domain/messages/reply';
import { readStaffReply } from '$lib/domain/messages/staff-reply';
import type { Context } from '../context';
import { mayHearStray } from '../access/messages';
import { loadPerson } from '../auth/people';
import { db, type Reader, type Tx } from '../db';
import { inboundMessages, users } from '../db/schema';
import { newId } from '../ids';
import { newestEpisode } from '../outbox/change';
import { write } from '../write';
import { optOut } from './consent';
import { onPatientText } from './patient-text';
import { senderOf, type Sender } from './sender';
import { requiredField, type GatewayForm } from './signature';
import { onSharedStaffText, onStaffText, onUnknownTake } from './staff-text';
import type { ReceivedText, Understood } from './understood';

/** Longer than any text that a gateway passes on. */
const BODY_MAX = 2_000;

/** Thrown inside the transaction to leave no trace of a call that was seen before. */
class AlreadyReceived extends Error {}

/**
 * Take in one text: store it, do what it asks for, and leave what no rule understands to a person. Everything is
 * committed before the gateway gets its answer; the same text posted again has no effect.
 */
export async function receiveText(form: GatewayForm, request: Context): Promise<void> {
	const from = requiredField(form, 'From');
	const text: ReceivedText = {
		id: newId(),
		providerId: requiredField(form, 'MessageSid'),
		body: (form.get('Body') ?? '').slice(0, BODY_MAX),
		now: request.now
	};
	const sender = await senderOf(db(), from);
	const context = { ...request, actor: actorOf(sender), key: null };
	try {
		await write(context, 'anyone', async (tx) => {
			await refuseKnown(tx, text.providerId);
			return store(tx, context, from, sender, text);
		});
	} catch (error) {
		if (!(error instanceof AlreadyReceived)) {
			throw error;
		}
	}
}

async function refuseKnown(tx: Tx, providerId: string): Promise<void> {
	if ((await tx.$count(inboundMessages, eq(inboundMessages.providerId, providerId))) > 0) {
		throw new AlreadyReceived();
	}
}

async function store(tx: Tx, context: Context, from: string, sender: Sender, text: ReceivedText) {
	const { understoodAs, handled, visitId, change } = await understand(tx, context, from, sender, text);
	const patientId = sender.kind === 'patient' ? sender.patient.id : null;
	await tx.insert(inboundMessages).values({
		id: text.id,
		providerId: text.providerId,
		fromNumber: from,
		body: text.body,
		at: text.now,
		patientId,
		userId: sender.kind === 'staff' ? sender.person.id : null,
		understoodAs,
		visitId: visitId ?? null,
		handledAt: handled ? text.now : null
	});
	const episodeId = patientId === null ? null : await newestEpisode(tx, patientId);
	const received: AuditEvent = {
		action: 'message.received',
		objectKind: 'inbound',
		objectId: text.id,
		episodeId,
		detail: { understoodAs, handled }
	};
	const audit: [AuditEvent, ...AuditEvent[]] = [received, ...[change?.audit ?? []].flat()];
	return {
		result: null,
		audit,
		entries: change?.entries,
		events: [...(await receivedEvents(tx, text.id, episodeId)), ...(change?.events ?? [])],
		messages: change?.messages
	};
}

async function understand(
	tx: Tx,
	context: Context,
	from: string,
	sender: Sender,
	text: ReceivedText
): Promise<Understood> {
	switch (sender.kind) {
		case 'patient':
			return onPatientText(tx, sender.patient, text);
		case 'staff':
			return onStaffText(tx, { ...context, actor: sender.person }, text);
		case 'shared-staff':
			return onSharedStaffText(from, text);
		case 'shared':
			return onSharedText(tx, from, sender, text);
		case 'unknown':
			return triesToTake(text)
				? onUnknownTake(from, text)
				: { understoodAs: 'unknown-number', handled: false };
	}
}

/** A number of several patients, or of a patient and staff: whose words these are cannot be told. */
async function onSharedText(
	tx: Tx,
	from: string,
	{ patients, withStaff }: Extract<Sender, { kind: 'shared' }>,
	text: ReceivedText
): Promise<Understood> {
	// Whoever of them it was, no more texts go to this number.
	if (readPatientReply(text.body) === 'stop') {
		await optOut(
			tx,
			patients.map(({ id }) => id),
			text.now
		);
	}
	// No patient knows a reply code.
	return withStaff && triesToTake(text)
		? onSharedStaffText(from, text)
		: { understoodAs: 'shared-number', handled: false };
}

function triesToTake({ body }: ReceivedText): boolean {
	const reply = readStaffReply(body);
	return reply.kind === 'take' && reply.code !== null;
}

function actorOf(sender: Sender): Actor | null {
	switch (sender.kind) {
		case 'patient':
			return { kind: 'patient', id: sender.patient.id };
		case 'staff':
			return sender.person;
		case 'shared-staff':
		case 'shared':
		case 'unknown':
			return null;
	}
}

/** Those who see the patient hear of it; what is filed under no patient is heard by who may see to it. */
async function receivedEvents(reader: Reader, id: string, episodeId: string | null): Promise<LiveEvent[]> {
	const event = { topic: 'message', kind: 'received', id, episodeId } as const;
	if (episodeId !== null) {
		return [event];
	}
	const rows = await reader
		.select({ id: users.id })
		.from(users)
		.where(and(eq(users.role, 'coordinator'), isNull(users.disabledAt)));
	const people = await Promise.all(rows.map((row) => loadPerson(reader, row.id)));
	const concerned = await mayHearStray(
		reader,
		people.filter((person) => person !== null),
		id
	);
	return concerned.map(({ id: userId }) => ({ ...event, userId }));
}
