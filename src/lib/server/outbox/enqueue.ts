import type { MessageChannel } from '$lib/domain/messages/codes';
import type { Tx } from '../db';
import { outbox } from '../db/schema';
import { newId } from '../ids';
import { copiesFor } from '../push/copies';

/** A message to be sent, described by what caused it. Exactly one of user, patient and address is given. */
export interface NewMessage {
	id?: string;
	kind: (typeof outbox.$inferInsert)['kind'];
	channel: MessageChannel;
	/** Names the cause; a second message with the same key is not written. */
	causeKey: string;
	userId?: string;
	patientId?: string;
	address?: string;
	subject?: string;
	body: string;
	/** A calendar file that goes with a mail. */
	calendar?: string;
	linkId?: string;
	/** The device that a notice is for. */
	deviceId?: string;
	/** What the devices say on which its reader wants notices; only beside a text. */
	notice?: { subject: string; text: string };
	ref: { kind: (typeof outbox.$inferInsert)['refKind']; id: string };
	/** Not before this instant; now when left out. */
	notBefore?: number;
	expiresAt: number;
}

/** Write messages into the outbox in the transaction of their cause. */
export async function enqueue(tx: Tx, now: number, messages: NewMessage[]): Promise<void> {
	for (const message of messages) {
		const id = message.id ?? newId();
		if (await write(tx, now, { ...message, id })) {
			await enqueue(tx, now, await copiesFor(tx, { ...message, id }));
		}
	}
}

/** @returns false where its cause had its message before */
async function write(tx: Tx, now: number, message: NewMessage & { id: string }): Promise<boolean> {
	const written = await tx
		.insert(outbox)
		.values({
			id: message.id,
			kind: message.kind,
			channel: message.channel,
			causeKey: message.causeKey,
			userId: message.userId ?? null,
			patientId: message.patientId ?? null,
			address: message.address ?? null,
			subject: message.subject ?? null,
			body: message.body,
			calendar: message.calendar ?? null,
			linkId: message.linkId ?? null,
			deviceId: message.deviceId ?? null,
			refKind: message.ref.kind,
			refId: message.ref.id,
			state: 'ready',
			createdAt: now,
			nextAt: message.notBefore ?? now,
			expiresAt: message.expiresAt
		})
		.onConflictDoNothing({ target: outbox.causeKey })
		.returning({ id: outbox.id });
	return written.length > 0;
}
