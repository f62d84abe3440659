import { describe, expect, it } from 'vitest';
import type { ClearanceState } from '../core/codes';
import { standingDuring, type RecordedMove } from './replay';

const ASKED = 1_000;
const GIVEN = 2_000;
const WITHDRAWN = 3_000;

function move(
	at: number,
	fromState: ClearanceState | null,
	toState: ClearanceState,
	more: Partial<RecordedMove> = {}
): RecordedMove {
	return { at, fromState, toState, limits: null, reviewOn: null, ...more };
}

const MOVES = [
	move(ASKED, null, 'asked'),
	move(GIVEN, 'asked', 'given-with-limits', { limits: { maxElevationDeg: 90 } }),
	move(WITHDRAWN, 'given-with-limits', 'withdrawn')
];

const stateIn = (moves: RecordedMove[], startedAt: number, endedAt = startedAt, day = '2026-03-03') =>
	standingDuring(moves, { startedAt, endedAt }, day)?.state ?? null;

describe('how a clearance stood at an instant', () => {
	it.each([
		[ASKED - 1, null],
		[ASKED, 'asked'],
		[GIVEN - 1, 'asked'],
		[GIVEN, 'given-with-limits'],
		[GIVEN + 1, 'given-with-limits'],
		[WITHDRAWN - 1, 'given-with-limits'],
		[WITHDRAWN, 'withdrawn'],
		[WITHDRAWN + 1, 'withdrawn']
	] as const)('at %d: %s', (at, state) => {
		expect(stateIn(MOVES, at)).toBe(state);
	});

	it('comes with the limits of then', () => {
		const later = [MOVES[0], MOVES[1], move(2_500, 'given-with-limits', 'given')].filter((m) => m != null);
		expect(standingDuring(later, { startedAt: 2_499, endedAt: 2_499 }, '2026-03-03')?.limits).toEqual({
			maxElevationDeg: 90
		});
		expect(standingDuring(later, { startedAt: 2_500, endedAt: 2_500 }, '2026-03-03')?.limits).toBeNull();
	});
});

describe('how a clearance stood during a session', () => {
	it.each([
		['given before it ended counts', GIVEN - 500, GIVEN + 500, 'given-with-limits'],
		['given at its last instant counts', GIVEN - 500, GIVEN, 'given-with-limits'],
		['given just after its end does not', GIVEN - 500, GIVEN - 1, 'asked'],
		[
			'withdrawn meanwhile it was in force when it began',
			WITHDRAWN - 1,
			WITHDRAWN + 500,
			'given-with-limits'
		],
		['withdrawn when it began it was not', WITHDRAWN, WITHDRAWN + 500, 'withdrawn']
	] as const)('%s', (_, startedAt, endedAt, state) => {
		expect(stateIn(MOVES, startedAt, endedAt)).toBe(state);
	});

	it.each([
		['2026-03-03', 'given'],
		['2026-03-04', 'given'],
		['2026-03-05', 'given-with-limits']
	] as const)('on %s, with a review date of the 4th and given anew meanwhile: %s', (day, state) => {
		const moves = [
			move(ASKED, null, 'asked'),
			move(GIVEN, 'asked', 'given', { reviewOn: '2026-03-04' }),
			move(WITHDRAWN, 'given', 'given-with-limits', { reviewOn: '2026-03-20' })
		];
		expect(stateIn(moves, GIVEN + 1, WITHDRAWN + 1, day)).toBe(state);
	});
});

describe('an ask that was taken back', () => {
	it.each([
		['before anybody decided permitted and held nothing', 'asked', true],
		['after it was given holds', 'given', false]
	] as const)('%s', (_, from, takenBack) => {
		const moves = [move(ASKED, null, 'asked'), move(GIVEN, from, 'withdrawn')];
		expect(standingDuring(moves, { startedAt: GIVEN, endedAt: GIVEN }, '2026-03-03')?.takenBack).toBe(
			takenBack
		);
	});
});
