/** Which move a visit allows in which state. One table; pages, the API and replies by text all ask it. */
import type { VisitState } from '../core/codes';

/** The last part of the address in the JSON API. */
export const VISIT_MOVES = ['confirm', 'cancel', 'attend', 'miss', 'reopen'] as const;
export type VisitMove = (typeof VISIT_MOVES)[number];

/**
 * From state and move to the next state. A cancelled visit stays cancelled: another one is booked. Attended and
 * missed may correct each other, or be taken back, because a patient comes late and a finger slips.
 */
const TABLE: Record<VisitState, Partial<Record<VisitMove, VisitState>>> = {
	planned: { confirm: 'confirmed', cancel: 'cancelled', attend: 'attended', miss: 'missed' },
	confirmed: { cancel: 'cancelled', attend: 'attended', miss: 'missed' },
	attended: { miss: 'missed', reopen: 'planned' },
	missed: { attend: 'attended', reopen: 'planned' },
	cancelled: {}
};

const DONE: Record<VisitMove, string> = {
	confirm: 'confirmed',
	cancel: 'cancelled',
	attend: 'marked as attended',
	miss: 'marked as missed',
	reopen: 'planned again'
};

/** The state after the move, or null when the state does not allow it. */
export function visitAfter(state: VisitState, move: VisitMove): VisitState | null {
	return TABLE[state][move] ?? null;
}

/** What is on record already is changed only by somebody who says why. */
export function needsReason(state: VisitState, move: VisitMove): boolean {
	return (state === 'attended' || state === 'missed') && visitAfter(state, move) !== null;
}

/** The moves a visit allows, in the order of `VISIT_MOVES`. */
export function movesOf(state: VisitState): VisitMove[] {
	return VISIT_MOVES.filter((move) => visitAfter(state, move) !== null);
}

/** Why a move is not possible, as a sentence that names the state. */
export function whyNot(state: VisitState, move: VisitMove): string {
	return `A visit that is ${state} cannot be ${DONE[move]}.`;
}

/** Whether the patient is still expected: only such a visit is reminded of and waits for an answer. */
export function isExpected(state: VisitState): boolean {
	return state === 'planned' || state === 'confirmed';
}
