import { describe, expect, it } from 'vitest';
import { ESCALATION_STATES, type EscalationState } from '../core/codes';
import { isOver, requireEscalationMove, type EscalationMove } from './states';

/** The states in the order of the columns: raised, taken, settled, withdrawn. */
const TABLE: Record<EscalationMove, readonly boolean[]> = {
	take: [true, true, false, false],
	eta: [false, true, false, false],
	arrive: [false, true, false, false],
	pass: [false, true, false, false],
	confirm: [false, true, false, false],
	settle: [false, true, false, false],
	inform: [false, false, true, false],
	withdraw: [true, true, false, false]
};
const ROWS = (Object.keys(TABLE) as EscalationMove[]).flatMap((move) =>
	ESCALATION_STATES.map((state, column) => [state, move, TABLE[move][column] ?? false] as const)
);

describe('requireEscalationMove', () => {
	it.each(ROWS)('%s: %s allowed %s', (state, move, allowed) => {
		const trying = () => requireEscalationMove(state, move);
		if (allowed) {
			expect(trying).not.toThrow();
		} else {
			expect(trying).toThrow(expect.objectContaining({ code: 'wrong-state', status: 409, extra: { state } }));
		}
	});
});

describe('isOver', () => {
	it.each<[EscalationState, boolean]>([
		['raised', false],
		['taken', false],
		['settled', true],
		['withdrawn', true]
	])('%s: %s', (state, over) => {
		expect(isOver(state)).toBe(over);
	});
});
