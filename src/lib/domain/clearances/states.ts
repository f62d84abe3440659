import type { ClearanceState } from '../core/codes';
import { Problem } from '../core/errors';
import type { ClearanceLimits } from './forms';

export type ClearanceMove = 'give' | 'withhold' | 'hold' | 'withdraw';

/**
 * Which move is allowed from which state. A decider may give again what is on hold or was given, with other
 * limits; what was withheld or withdrawn must be asked anew, so that the evidence is of today.
 */
const ALLOWED: Record<ClearanceMove, readonly ClearanceState[]> = {
	give: ['asked', 'on-hold', 'given', 'given-with-limits'],
	withhold: ['asked', 'on-hold'],
	hold: ['given', 'given-with-limits'],
	withdraw: ['asked', 'given', 'given-with-limits', 'on-hold']
};

/**
 * The state after a move.
 * @throws Problem `already-given` when an ask is decided a second time, else `wrong-state` with the state
 */
export function nextClearanceState(
	state: ClearanceState,
	move: ClearanceMove,
	limits?: ClearanceLimits | null
): ClearanceState {
	if (!ALLOWED[move].includes(state)) {
		throw new Problem('wrong-state', `The clearance is ${state}; "${move}" is not possible now.`, { state });
	}
	switch (move) {
		case 'give':
			return limits && Object.keys(limits).length > 0 ? 'given-with-limits' : 'given';
		case 'withhold':
			return 'withheld';
		case 'hold':
			return 'on-hold';
		case 'withdraw':
			return 'withdrawn';
	}
}

/** Given, with or without limits, and its review date not yet past. */
export function isInForce(
	clearance: { state: ClearanceState; reviewOn: string | null },
	today: string
): boolean {
	const given = clearance.state === 'given' || clearance.state === 'given-with-limits';
	return given && (clearance.reviewOn === null || today <= clearance.reviewOn);
}

/** The only headlines on screens; why stands below. */
export type ClearanceHeadline = 'cleared' | 'cleared-with-limits' | 'not-cleared';

export function headline(state: ClearanceState | null): ClearanceHeadline {
	switch (state) {
		case 'given':
			return 'cleared';
		case 'given-with-limits':
			return 'cleared-with-limits';
		default:
			return 'not-cleared';
	}
}
