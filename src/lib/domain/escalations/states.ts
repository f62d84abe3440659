import type { EscalationState } from '../core/codes';
import { Problem } from '../core/errors';

export type EscalationMove =
	'take' | 'eta' | 'arrive' | 'pass' | 'confirm' | 'settle' | 'inform' | 'withdraw';

const ALLOWED: Record<EscalationMove, readonly EscalationState[]> = {
	// A taken one too, when others are sought beside its holder; who that is decides `isOpenTo`.
	take: ['raised', 'taken'],
	eta: ['taken'],
	arrive: ['taken'],
	pass: ['taken'],
	confirm: ['taken'],
	settle: ['taken'],
	inform: ['settled'],
	withdraw: ['raised', 'taken']
};

/** @throws Problem `wrong-state` naming the state that does not allow the move */
export function requireEscalationMove(state: EscalationState, move: EscalationMove): void {
	if (!ALLOWED[move].includes(state)) {
		throw new Problem('wrong-state', `The escalation is ${state}; "${move}" is not possible now.`, { state });
	}
}

/** Settled or withdrawn: nobody is needed any more. */
export function isOver(state: EscalationState): boolean {
	return state === 'settled' || state === 'withdrawn';
}
