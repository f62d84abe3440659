import type { MessageChannel } from '$lib/domain/messages/codes';
import type { Tx } from '../db';
import { outbox } from '../db/schema';
import { newId } from '../ids';

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
	ref: { kind: (typeof outbox.$inferInsert)['refKind']; id: string };
	/** Not before this instant; now when left out. */
	notBefore?: number;
	expiresAt: number;
}

/** Write messages into the outbox in the transaction of their cause. */
export async function enqueue(tx: Tx, now: number, messages: NewMessage[]): Promise<void> {
	for (const message of messages) {
		await tx
			.insert(outbox)
			.values({
				id: message.id ?? newId(),
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
				refKind: message.ref.kind,
				refId: message.ref.id,
				state: 'ready',
				createdAt: now,
				nextAt: message.notBefore ?? now,
				expiresAt: message.expiresAt
			})
			.onConflictDoNothing({ target: outbox.causeKey });
	}
}
