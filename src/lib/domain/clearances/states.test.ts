import { describe, expect, it } from 'vitest';
import { CLEARANCE_STATES, type ClearanceState } from '../core/codes';
import { isInForce, mustSayWhatStood, nextClearanceState, stateOn, type ClearanceMove } from './states';

/** What each state allows, in the order of the columns: give, ask back, withhold, hold, withdraw. */
const COLUMNS: readonly ClearanceMove[] = ['give', 'ask-back', 'withhold', 'hold', 'withdraw'];
const TABLE: Record<ClearanceState, readonly (ClearanceState | null)[]> = {
	asked: ['given', 'asked', 'withheld', null, 'withdrawn'],
	given: ['given', null, null, 'on-hold', 'withdrawn'],
	'given-with-limits': ['given', null, null, 'on-hold', 'withdrawn'],
	withheld: [null, null, null, null, null],
	'on-hold': ['given', null, 'withheld', null, 'withdrawn'],
	withdrawn: [null, null, null, null, null],
	lapsed: [null, null, null, null, null]
};
const ROWS = CLEARANCE_STATES.flatMap((state) =>
	COLUMNS.map((move, column) => [state, move, TABLE[state][column] ?? null] as const)
);

describe('nextClearanceState', () => {
	it.each(ROWS)('%s: %s makes it %s', (state, move, expected) => {
		if (expected === null) {
			expect(() => nextClearanceState(state, move)).toThrow(
				expect.objectContaining({ code: 'wrong-state', status: 409, extra: { state } })
			);
		} else {
			expect(nextClearanceState(state, move)).toBe(expected);
		}
	});

	it.each([
		[{}, 'given'],
		[null, 'given'],
		[{ maxElevationDeg: 0 }, 'given-with-limits']
	] as const)('given with %o is %s', (limits, expected) => {
		expect(nextClearanceState('asked', 'give', limits)).toBe(expected);
	});
});

describe('mustSayWhatStood', () => {
	it.each(ROWS)('%s: %s', (state, move) => {
		const changesGiven = move === 'give' && state.startsWith('given');
		expect(mustSayWhatStood(state, move)).toBe(changesGiven);
	});
});

describe('stateOn', () => {
	it.each([
		['given', '2026-03-03', 'given'],
		['given', '2026-03-02', 'lapsed'],
		['given-with-limits', '2026-03-03', 'given-with-limits'],
		['given-with-limits', '2026-03-02', 'lapsed'],
		['on-hold', '2026-03-03', 'on-hold'],
		['on-hold', '2026-03-02', 'lapsed'],
		['asked', '2026-03-02', 'asked'],
		['withheld', '2026-03-02', 'withheld'],
		['withdrawn', '2026-03-02', 'withdrawn'],
		['lapsed', '2026-03-04', 'lapsed'],
		['given', null, 'given']
	] as const)('%s until %s is %s on 3 March 2026', (state, reviewOn, expected) => {
		expect(stateOn({ state, reviewOn }, '2026-03-03')).toBe(expected);
	});
});

describe('isInForce', () => {
	it.each(CLEARANCE_STATES)('%s: never after its last day', (state) => {
		expect(isInForce({ state, reviewOn: '2026-03-02' }, '2026-03-03')).toBe(false);
	});

	it.each(CLEARANCE_STATES)('%s: on its last day only where it was given', (state) => {
		expect(isInForce({ state, reviewOn: '2026-03-03' }, '2026-03-03')).toBe(state.startsWith('given'));
	});
});
