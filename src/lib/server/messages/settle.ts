import { eq } from 'drizzle-orm';
import { Problem } from '$lib/domain/core/errors';
import { m } from '$lib/i18n/paraglide/messages';
import { threadForDeed } from '../access/thread';
import { accessInboundText, accessMessage } from '../access/messages';
import type { PersonContext } from '../context';
import { inboundMessages, outbox } from '../db/schema';
import { write, type Written } from '../write';

/** A message that did not arrive is seen to: the person was called, or it does not matter any more. */
export function settleMessage(context: PersonContext, id: string): Promise<Written<{ id: string }>> {
	return write(context, 'visit.plan', async (tx) => {
		const { message, episodeId } = await accessMessage(tx, context.actor, id);
		const failed = message.state === 'failed' || message.state === 'undelivered';
		if (!failed || message.handledAt !== null) {
			const { state } = message;
			throw new Problem('wrong-state', 'Nothing waits to be seen to about this message.', { state });
		}
		await tx
			.update(outbox)
			.set({ handledAt: context.now, handledBy: context.actor.id })
			.where(eq(outbox.id, id));
		return settled('message', id, episodeId);
	});
}

/**
 * A text that no rule understood was read and answered by a person. What they did stands beside it, and with the
 * patient's words in the thread, where those who treat the patient read it.
 */
export function settleInbound(
	context: PersonContext,
	id: string,
	{ note }: { note: string }
): Promise<Written<{ id: string }>> {
	return write(context, 'visit.plan', async (tx) => {
		const { text, episodeId } = await accessInboundText(tx, context.actor, id);
		if (text.handledAt !== null) {
			throw new Problem('wrong-state', 'Somebody has seen to this text already.', { state: 'handled' });
		}
		await tx
			.update(inboundMessages)
			.set({ handledAt: context.now, handledBy: context.actor.id, handledNote: note })
			.where(eq(inboundMessages.id, id));
		const threadId = episodeId === null ? null : await threadForDeed(tx, episodeId, context.actor);
		const body = m.home_entry_text({ text: text.body, note });
		return {
			...settled('inbound', id, episodeId),
			entries: threadId === null ? [] : [{ threadId, kind: 'event', strand: 'patient', body }]
		};
	});
}

function settled(objectKind: 'message' | 'inbound', id: string, episodeId: string | null) {
	return {
		result: { id },
		audit: { action: 'message.settled' as const, objectKind, objectId: id, episodeId },
		events: [{ topic: 'message' as const, kind: 'settled', id, episodeId }]
	};
}
