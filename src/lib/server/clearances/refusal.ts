import { eq } from 'drizzle-orm';
import { Problem } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import { CLEARANCE_WORDS } from '$lib/i18n/labels';
import { m } from '$lib/i18n/paraglide/messages';
import { accessClearance } from '../access/access';
import type { PersonContext } from '../context';
import { clearances } from '../db/schema';
import { write, type Written } from '../write';

type ClearanceRow = typeof clearances.$inferSelect;

const REFUSALS: readonly ClearanceRow['state'][] = ['withheld', 'on-hold', 'withdrawn'];

/** Whether it is a no of somebody else that whoever asked has not said they saw. */
export function isUnseenRefusal({ state, decidedBy, askedBy, refusalSeenAt }: ClearanceRow): boolean {
	return REFUSALS.includes(state) && decidedBy !== null && decidedBy !== askedBy && refusalSeenAt === null;
}

/**
 * Whoever asked has seen that it is not cleared, and why: the loop of their ask is closed. It changes nothing of the
 * decision.
 * @throws Problem `not-allowed` for anybody else; `wrong-state` when there is no such answer, or it was seen already
 */
export function acknowledgeRefusal(
	context: PersonContext,
	id: string
): Promise<Written<{ id: string; seenAt: string }>> {
	return write(context, 'thread.read', async (tx) => {
		const { clearance } = await accessClearance(tx, context.actor, id, 'thread.read');
		const { kind, episodeId, threadId, state } = clearance;
		if (clearance.askedBy !== context.actor.id) {
			throw new Problem('not-allowed', 'Only whoever asked can say that they have seen the answer.');
		}
		if (!isUnseenRefusal(clearance)) {
			throw new Problem('wrong-state', 'There is no answer here that waits to be seen.', { state });
		}
		await tx.update(clearances).set({ refusalSeenAt: context.now }).where(eq(clearances.id, id));
		const body = m.clearances_entry_refusal_seen({ kind: CLEARANCE_WORDS[kind]() });
		return {
			result: { id, seenAt: toRfc3339(context.now) },
			audit: {
				action: 'clearance.refusal-seen',
				objectKind: 'clearance',
				objectId: id,
				episodeId,
				detail: { kind, state }
			},
			entries: threadId ? [{ threadId, kind: 'event', body, ref: { kind: 'clearance', id } }] : [],
			events: [{ topic: 'clearance', kind: 'refusal-seen', id, episodeId }]
		};
	});
}
