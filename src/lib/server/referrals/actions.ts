import { eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { AuditAction } from '$lib/domain/audit/actions';
import { Problem } from '$lib/domain/core/errors';
import type { ReferralState } from '$lib/domain/core/codes';
import type { referBody } from '$lib/domain/referrals/forms';
import { nextReferralState, type ReferralMove } from '$lib/domain/referrals/states';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEpisode, accessReferral } from '../access/access';
import type { PersonContext } from '../context';
import { referrals, threads } from '../db/schema';
import { newId } from '../ids';
import { tellReferralClosed } from '../visits/notify';
import { write, type Written } from '../write';

/**
 * Ask a service to take on a patient. The thread of the referral begins with the question. A second one to the same
 * service is a question of its own: the page says that one goes on, and leaves it to the person.
 */
export function refer(
	context: PersonContext,
	episodeId: string,
	input: z.infer<typeof referBody>
): Promise<Written<{ id: string; threadId: string; state: 'asked' }>> {
	return write(context, 'referral.create', async (tx) => {
		await accessEpisode(tx, context.actor, episodeId, 'referral.create');
		const id = newId();
		const threadId = newId();
		await tx.insert(referrals).values({
			id,
			episodeId,
			service: input.service,
			priority: input.priority,
			question: input.question,
			state: 'asked',
			askedBy: context.actor.id,
			askedAt: context.now
		});
		await tx.insert(threads).values({ id: threadId, referralId: id, episodeId });
		return {
			result: { id, threadId, state: 'asked' },
			audit: { action: 'referral.asked', objectKind: 'referral', objectId: id, episodeId },
			entries: [{ threadId, kind: 'ask', body: input.question, ref: { kind: 'referral', id } }],
			events: [{ topic: 'referral', kind: 'asked', id, episodeId }]
		};
	});
}

export function acceptReferral(context: PersonContext, id: string) {
	return answer(context, id, 'accept', null);
}

export function declineReferral(context: PersonContext, id: string, reason: string) {
	return answer(context, id, 'decline', reason);
}

export function closeReferral(context: PersonContext, id: string, reason: string | null) {
	return answer(context, id, 'close', reason);
}

/** Only who asked takes it back; somebody else asks them to. */
export function withdrawReferral(context: PersonContext, id: string, reason: string) {
	return answer(context, id, 'withdraw', reason);
}

const MOVES = {
	accept: { permission: 'referral.answer', action: 'referral.accepted', kind: 'answer' },
	decline: { permission: 'referral.answer', action: 'referral.declined', kind: 'answer' },
	close: { permission: 'referral.close', action: 'referral.closed', kind: 'event' },
	withdraw: { permission: 'referral.withdraw', action: 'referral.withdrawn', kind: 'event' }
} as const satisfies Record<
	ReferralMove,
	{ permission: string; action: AuditAction; kind: 'answer' | 'event' }
>;

function answer(
	context: PersonContext,
	id: string,
	move: ReferralMove,
	reason: string | null
): Promise<Written<{ id: string; state: ReferralState }>> {
	const { permission, action, kind } = MOVES[move];
	return write(context, permission, async (tx) => {
		const { referral, threadId } = await accessReferral(tx, context.actor, id, permission);
		if (move === 'withdraw' && referral.askedBy !== context.actor.id) {
			throw new Problem('not-allowed', 'Only the person who asked can withdraw a referral.');
		}
		const state = nextReferralState(referral.state, move);
		await tx
			.update(referrals)
			.set({ state, decidedBy: context.actor.id, decidedAt: context.now, reason })
			.where(eq(referrals.id, id));
		return {
			result: { id, state },
			audit: { action, objectKind: 'referral', objectId: id, episodeId: referral.episodeId },
			entries: [{ threadId, kind, body: entryText(move, reason), ref: { kind: 'referral', id } }],
			events: [{ topic: 'referral', kind: state, id, episodeId: referral.episodeId }],
			messages: move === 'close' ? tellReferralClosed(referral, threadId, context.actor.id, context.now) : []
		};
	});
}

function entryText(move: ReferralMove, reason: string | null): string {
	switch (move) {
		case 'accept':
			return m.referrals_entry_accepted();
		case 'decline':
			return m.referrals_entry_declined({ reason: reason ?? '' });
		case 'close':
			return reason ? m.referrals_entry_closed_because({ reason }) : m.referrals_entry_closed();
		case 'withdraw':
			return m.referrals_entry_withdrawn({ reason: reason ?? '' });
	}
}
