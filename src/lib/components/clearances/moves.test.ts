import { describe, expect, it } from 'vitest';
import type { Person } from '$lib/domain/access/actor';
import { nextClearanceState, type ClearanceMove } from '$lib/domain/clearances/states';
import { CLEARANCE_STATES, type ClearanceState, type Role } from '$lib/domain/core/codes';
import { movesOf, type Moves } from './moves';

const person = (role: Role, id = 'p1'): Person => ({
	kind: 'person',
	id,
	name: 'N',
	role,
	unitIds: ['ward']
});
const stairs = (state: ClearanceState, more: { current?: boolean; askedById?: string } = {}) => ({
	kind: 'stairs' as const,
	state,
	current: true,
	askedById: 'somebody',
	...more
});
const NOTHING: Moves = { give: null, withhold: false, hold: false, withdraw: null };

describe('movesOf', () => {
	it.each<[ClearanceState, Moves]>([
		['asked', { give: 'first', withhold: true, hold: false, withdraw: null }],
		['on-hold', { give: 'first', withhold: true, hold: false, withdraw: 'decision' }],
		['given', { give: 'again', withhold: false, hold: true, withdraw: 'decision' }],
		['given-with-limits', { give: 'again', withhold: false, hold: true, withdraw: 'decision' }],
		['withheld', NOTHING],
		['withdrawn', NOTHING],
		['lapsed', NOTHING]
	])('of a decider on what is %s', (state, moves) => {
		expect(movesOf(person('physician'), 'ward', stairs(state))).toEqual(moves);
	});

	it.each(CLEARANCE_STATES)('offers nothing on %s that the server would refuse', (state) => {
		const moves = movesOf(person('surgeon'), 'ward', stairs(state, { askedById: 'p1' }));
		const offered = (Object.keys(moves) as ClearanceMove[]).filter((move) => moves[move]);
		for (const move of offered) {
			expect(() => nextClearanceState(state, move)).not.toThrow();
		}
		expect(offered.length === 0).toBe(['withheld', 'withdrawn', 'lapsed'].includes(state));
	});

	it.each<[string, Person, string]>([
		['a nurse', person('nurse'), 'ward'],
		['a speech therapist, whose kind it is not', person('speech-therapist'), 'ward'],
		['a surgeon of another unit', person('surgeon'), 'elsewhere']
	])('offers %s nothing', (_, viewer, unitId) => {
		expect(movesOf(viewer, unitId, stairs('asked'))).toEqual(NOTHING);
	});

	it('lets whoever asked take back the ask, as long as it is open', () => {
		const viewer = person('therapist', 't1');
		expect(movesOf(viewer, 'ward', stairs('asked', { askedById: 't1' })).withdraw).toBe('ask');
		expect(movesOf(viewer, 'ward', stairs('given', { askedById: 't1' })).withdraw).toBeNull();
	});

	it('does not give what counts from an earlier operation', () => {
		const moves = movesOf(person('surgeon'), 'ward', stairs('asked', { current: false }));
		expect(moves).toEqual({ give: null, withhold: true, hold: false, withdraw: null });
	});
});
