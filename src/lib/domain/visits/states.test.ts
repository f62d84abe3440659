import { describe, expect, it } from 'vitest';
import { VISIT_STATES } from '../core/codes';
import { VISIT_MOVES, isExpected, movesOf, needsReason, visitAfter, whyNot } from './states';

/** Every state against every move; `-` is refused. */
const MOVES = [
	// state, confirm, cancel, attend, miss, reopen
	['planned', 'confirmed', 'cancelled', 'attended', 'missed', '-'],
	['confirmed', '-', 'cancelled', 'attended', 'missed', '-'],
	['attended', '-', '-', '-', 'missed', 'planned'],
	['missed', '-', '-', 'attended', '-', 'planned'],
	['cancelled', '-', '-', '-', '-', '-']
] as const;

describe('the moves of a visit', () => {
	it.each(MOVES)('%s', (state, ...next) => {
		VISIT_MOVES.forEach((move, index) => {
			expect(visitAfter(state, move) ?? '-', `${state} ${move}`).toBe(next[index]);
		});
		expect(movesOf(state)).toEqual(VISIT_MOVES.filter((_, index) => next[index] !== '-'));
	});

	it('the table covers every state', () => {
		expect(MOVES.map(([state]) => state)).toEqual([...VISIT_STATES]);
	});

	it('only taking back leads to planned', () => {
		const back = VISIT_STATES.flatMap((state) =>
			VISIT_MOVES.filter((move) => visitAfter(state, move) === 'planned').map((move) => `${state} ${move}`)
		);
		expect(back).toEqual(['attended reopen', 'missed reopen']);
	});

	it('what is on record is changed with a reason, and nothing else needs one', () => {
		const needing = VISIT_STATES.flatMap((state) =>
			VISIT_MOVES.filter((move) => needsReason(state, move)).map((move) => `${state} ${move}`)
		);
		expect(needing).toEqual(['attended miss', 'attended reopen', 'missed attend', 'missed reopen']);
	});

	it.each([
		['cancelled', 'confirm', 'A visit that is cancelled cannot be confirmed.'],
		['attended', 'cancel', 'A visit that is attended cannot be cancelled.'],
		['missed', 'miss', 'A visit that is missed cannot be marked as missed.'],
		['cancelled', 'attend', 'A visit that is cancelled cannot be marked as attended.']
	] as const)('%s %s: %s', (state, move, sentence) => {
		expect(whyNot(state, move)).toBe(sentence);
	});

	it('only planned and confirmed visits are expected', () => {
		expect(VISIT_STATES.filter(isExpected)).toEqual(['planned', 'confirmed']);
	});
});
