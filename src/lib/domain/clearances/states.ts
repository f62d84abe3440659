import type { ClearanceState } from '../core/codes';
import { Problem } from '../core/errors';
import type { ClearanceLimits } from './forms';

/** The moves that decide; asking back leaves the ask as it is. */
export type DecidingMove = 'give' | 'withhold' | 'hold' | 'withdraw';
export type ClearanceMove = DecidingMove | 'ask-back';

/**
 * Which move is allowed from which state. A decider may give again what is on hold or was given, with other
 * limits; what was withheld or withdrawn must be asked anew, so that the evidence is of today.
 */
const ALLOWED: Record<ClearanceMove, readonly ClearanceState[]> = {
	give: ['asked', 'on-hold', 'given', 'given-with-limits'],
	'ask-back': ['asked'],
	withhold: ['asked', 'on-hold'],
	hold: ['given', 'given-with-limits'],
	withdraw: ['asked', 'given', 'given-with-limits', 'on-hold']
};

/**
 * The state after a move.
 * @throws Problem `wrong-state` with the state that does not allow it
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
		case 'ask-back':
			return 'asked';
		case 'withhold':
			return 'withheld';
		case 'hold':
			return 'on-hold';
		case 'withdraw':
			return 'withdrawn';
	}
}

/**
 * Whether a move must say which decision it goes from: other limits for what was given are a change of somebody's
 * decision, and two first decisions at once must not pass for one.
 */
export function mustSayWhatStood(state: ClearanceState, move: ClearanceMove): boolean {
	return move === 'give' && (state === 'given' || state === 'given-with-limits');
}

/** Whether a decision can be made on it: first, again with other limits, or to hold or take back. */
export function isDecidable(state: ClearanceState): boolean {
	return ALLOWED.give.includes(state);
}

/** A clearance as far as its end is concerned; `reviewOn` is a day in the hospital's calendar, itself included. */
export interface Ending {
	state: ClearanceState;
	reviewOn: string | null;
}

/** The states that an end can come to: what is asked has none, and what is over has ended already. */
export const ENDING_STATES = ['given', 'given-with-limits', 'on-hold'] as const;

/**
 * The state on a day of the hospital's calendar. What is past its end has lapsed, whether or not the work that
 * writes it down has run: between the two it must never be read as in force.
 */
export function stateOn({ state, reviewOn }: Ending, today: string): ClearanceState {
	const ends = (ENDING_STATES as readonly ClearanceState[]).includes(state);
	return ends && reviewOn !== null && reviewOn < today ? 'lapsed' : state;
}

/** Given, with or without limits, and its review date not yet past. */
export function isInForce(clearance: Ending, today: string): boolean {
	const state = stateOn(clearance, today);
	return state === 'given' || state === 'given-with-limits';
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
