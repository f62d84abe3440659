import { Problem } from '../core/errors';
import type { ReferralState } from '../core/codes';

/** The states in which a referral still goes on: a second one to the same service would divide the talk. */
export const OPEN_REFERRAL_STATES = ['asked', 'accepted'] as const satisfies readonly ReferralState[];

export type ReferralMove = 'accept' | 'decline' | 'close' | 'withdraw';

/** Which move is allowed from which state, and where it leads. What is not in the table is refused. */
const MOVES: Record<ReferralMove, Partial<Record<ReferralState, ReferralState>>> = {
	accept: { asked: 'accepted' },
	decline: { asked: 'declined' },
	close: { accepted: 'closed' },
	withdraw: { asked: 'withdrawn', accepted: 'withdrawn' }
};

/**
 * The state after a move.
 * @throws Problem `wrong-state` naming the state that does not allow it
 */
export function nextReferralState(state: ReferralState, move: ReferralMove): ReferralState {
	const next = MOVES[move][state];
	if (!next) {
		throw new Problem(
			'wrong-state',
			`The referral is ${state}; it cannot be changed by "${move}" any more.`,
			{
				state
			}
		);
	}
	return next;
}
