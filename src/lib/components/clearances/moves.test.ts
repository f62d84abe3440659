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
	questions: [],
	...more
});
const NOTHING: Moves = {
	give: null,
	withhold: false,
	hold: false,
	withdraw: null,
	askBack: false,
	answer: false
};

describe('movesOf', () => {
	it.each<[ClearanceState, Moves]>([
		['asked', { ...NOTHING, give: 'first', withhold: true, askBack: true }],
		['on-hold', { ...NOTHING, give: 'first', withhold: true, withdraw: 'decision' }],
		['given', { ...NOTHING, give: 'again', hold: true, withdraw: 'decision' }],
		['given-with-limits', { ...NOTHING, give: 'again', hold: true, withdraw: 'decision' }],
		['withheld', NOTHING],
		['withdrawn', NOTHING],
		['lapsed', NOTHING]
	])('of a decider on what is %s', (state, moves) => {
		expect(movesOf(person('physician'), 'ward', stairs(state))).toEqual(moves);
	});

	it.each(CLEARANCE_STATES)('offers nothing on %s that the server would refuse', (state) => {
		const moves = movesOf(person('surgeon'), 'ward', stairs(state, { askedById: 'p1' }));
		const offered = Object.entries(moves).flatMap(([move, open]) => (open ? [move] : []));
		for (const move of offered.map((name) => (name === 'askBack' ? 'ask-back' : name) as ClearanceMove)) {
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

	it('asks back once at a time, and lets whoever may ask answer', () => {
		const question = {
			id: 'q1',
			question: 'Does it click?',
			askedBy: 'N',
			askedAt: '2026-03-03T09:00:00Z',
			answer: null,
			answeredBy: null,
			answeredAt: null
		};
		const waiting = { ...stairs('asked'), questions: [question] };
		expect(movesOf(person('surgeon'), 'ward', waiting)).toMatchObject({
			give: 'unanswered',
			withhold: true,
			askBack: false,
			answer: false
		});
		expect(movesOf(person('therapist'), 'ward', waiting)).toMatchObject({ askBack: false, answer: true });
		const answered = { ...waiting, questions: [{ ...question, answer: 'No.' }] };
		expect(movesOf(person('surgeon'), 'ward', answered)).toMatchObject({ give: 'first', askBack: true });
		expect(movesOf(person('therapist'), 'ward', answered).answer).toBe(false);
	});

	it('does not give what counts from an earlier operation', () => {
		const moves = movesOf(person('surgeon'), 'ward', stairs('asked', { current: false }));
		expect(moves).toEqual({ ...NOTHING, withhold: true, askBack: true });
	});
});
