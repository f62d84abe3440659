import { describe, expect, it } from 'vitest';
import type { Person } from '../access/actor';
import { ROLES, type Role } from '../core/codes';
import { movesFor } from './moves';

const UNIT = 'tern';

function person(role: Role, id: string = role, unitIds = [UNIT]): Person {
	return { kind: 'person', id, name: id, role, unitIds };
}

const RAISED = {
	state: 'raised',
	grade: 'high',
	unitId: UNIT,
	holder: null,
	passTo: null,
	raisedBy: { id: 'therapist', name: 'Iris', role: 'therapist' },
	otherCallers: [],
	arrivedAt: null,
	askedAt: null,
	next: null,
	informed: null
} as const;
const TAKEN = { ...RAISED, state: 'taken', holder: { id: 'nurse', name: 'Rose' } } as const;
const THERE = { ...TAKEN, arrivedAt: '2026-03-03T09:04:00Z' } as const;
const SOUGHT = {
	...TAKEN,
	askedAt: '2026-03-03T09:15:00Z',
	next: { step: 1, posts: ['nurse'], at: '2026-03-03T09:18:00Z' }
} as const;
const PASSED = { ...THERE, passTo: { id: 'physician', name: 'Piet' } } as const;

describe('movesFor', () => {
	it.each(ROLES)('lets a %s take it only where the role may', (role) => {
		const takes = ['nurse', 'physician', 'surgeon'].includes(role);
		expect(movesFor(RAISED, person(role, 'somebody'))).toEqual(takes ? ['take'] : []);
	});

	it.each([
		['raised, its raiser', RAISED, person('therapist'), ['withdraw']],
		[
			'raised by a nurse, the same nurse',
			{ ...RAISED, raisedBy: { id: 'nurse', name: 'Rose', role: 'nurse' } },
			person('nurse'),
			['take', 'withdraw']
		],
		['taken, the holder', TAKEN, person('nurse'), ['arrive', 'eta', 'pass', 'settle']],
		[
			'sought anew, the holder who did not come',
			SOUGHT,
			person('nurse'),
			['arrive', 'eta', 'pass', 'settle']
		],
		['sought anew, another nurse', SOUGHT, person('nurse', 'nurse2'), ['take']],
		[
			'made graver, its holder',
			{ ...SOUGHT, askedAt: null },
			person('nurse'),
			['take', 'arrive', 'eta', 'pass', 'settle']
		],
		['at the bedside, the holder', THERE, person('nurse'), ['settle', 'pass']],
		['taken, another nurse', TAKEN, person('nurse', 'nurse2'), []],
		[
			'raised, its raiser, when another called too',
			{ ...RAISED, otherCallers: [{ id: 'speech', name: 'Mae' }] },
			person('therapist'),
			[]
		],
		['taken, its raiser', TAKEN, person('therapist'), ['withdraw']],
		['passed on, the receiver', PASSED, person('physician'), ['confirm']],
		['passed on, the giver', PASSED, person('nurse'), ['settle', 'pass']],
		['settled, no physician named', { ...TAKEN, state: 'settled' }, person('nurse'), ['inform']],
		['settled, one named', { ...TAKEN, state: 'settled', informed: 'M. L.' }, person('nurse'), []],
		['settled, of medium grade', { ...TAKEN, state: 'settled', grade: 'medium' }, person('nurse'), []],
		['settled, its raiser', { ...TAKEN, state: 'settled' }, person('therapist'), []],
		['withdrawn, a nurse', { ...RAISED, state: 'withdrawn' }, person('nurse'), []],
		['raised, a nurse of another unit', RAISED, person('nurse', 'nurse', ['gym']), []]
	] as const)('%s', (_, facts, who, moves) => {
		expect(movesFor(facts, who)).toEqual(moves);
	});
});
