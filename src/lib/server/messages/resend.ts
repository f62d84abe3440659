import { eq } from 'drizzle-orm';
import { notFound, Problem } from '$lib/domain/core/errors';
import { endOfResent, mayBeResent } from '$lib/domain/messages/log';
import { requirePermission } from '../access/require';
import type { PersonContext } from '../context';
import { outbox, outboxResends } from '../db/schema';
import { newId } from '../ids';
import { episodeOfMessage, messageEvent } from '../outbox/change';
import { write, type Written } from '../write';

/**
 * Have a message sent again. It stays the same message, so that whatever hangs on it hears of its new fate; its
 * schedule begins anew. It is checked again before it goes: what is not wanted any more is skipped now as well.
 * @throws Problem `not-found`; `wrong-state` while it is under way, where it arrived, and when it came too late
 */
export function resendMessage(
	context: PersonContext,
	id: string,
	{ reason }: { reason: string }
): Promise<Written<{ id: string; state: 'ready' }>> {
	return write(context, 'message.resend', async (tx) => {
		requirePermission(context.actor, 'message.resend');
		const [row] = await tx.select().from(outbox).where(eq(outbox.id, id));
		if (!row) {
			throw notFound('message');
		}
		const { now } = context;
		const { state } = row;
		if (!mayBeResent(state) || row.body === '') {
			throw new Problem('wrong-state', 'This message is not to be sent again.', { state });
		}
		const expiresAt = endOfResent(row, now);
		if (expiresAt <= now) {
			throw new Problem('wrong-state', 'It is too late for this message.', { state });
		}
		await tx
			.insert(outboxResends)
			.values({ id: newId(), messageId: id, at: now, byId: context.actor.id, reason });
		await tx
			.update(outbox)
			.set({
				...{ state: 'ready', stateReason: null, nextAt: now, expiresAt },
				...{ sentAt: null, providerId: null, handledAt: null, handledBy: null }
			})
			.where(eq(outbox.id, id));
		return {
			result: { id, state: 'ready' as const },
			audit: {
				action: 'message.resent',
				objectKind: 'message',
				objectId: id,
				episodeId: await episodeOfMessage(tx, row),
				detail: { before: state }
			},
			events: [await messageEvent(tx, row, 'ready')]
		};
	});
}
