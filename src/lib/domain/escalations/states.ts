import type { EscalationState } from '../core/codes';
import { Problem } from '../core/errors';

export type EscalationMove = 'take' | 'arrive' | 'pass' | 'confirm' | 'settle' | 'withdraw';

const ALLOWED: Record<EscalationMove, readonly EscalationState[]> = {
	take: ['raised'],
	arrive: ['taken'],
	pass: ['taken'],
	confirm: ['taken'],
	settle: ['taken'],
	withdraw: ['raised', 'taken']
};

/** @throws Problem `wrong-state` naming the state that does not allow the move */
export function requireEscalationMove(state: EscalationState, move: EscalationMove): void {
	if (!ALLOWED[move].includes(state)) {
		throw new Problem('wrong-state', `The escalation is ${state}; "${move}" is not possible now.`, { state });
	}
}
