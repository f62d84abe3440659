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
	unitId: UNIT,
	holder: null,
	passTo: null,
	raisedBy: { id: 'therapist', name: 'Iris', role: 'therapist' },
	arrivedAt: null
} as const;
const TAKEN = { ...RAISED, state: 'taken', holder: { id: 'nurse', name: 'Rose' } } as const;
const THERE = { ...TAKEN, arrivedAt: '2026-03-03T09:04:00Z' } as const;
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
		['taken, the holder', TAKEN, person('nurse'), ['arrive', 'pass', 'settle']],
		['at the bedside, the holder', THERE, person('nurse'), ['settle', 'pass']],
		['taken, another nurse', TAKEN, person('nurse', 'nurse2'), []],
		['taken, its raiser', TAKEN, person('therapist'), ['withdraw']],
		['passed on, the receiver', PASSED, person('physician'), ['confirm']],
		['passed on, the giver', PASSED, person('nurse'), ['settle', 'pass']],
		['settled, the last holder', { ...TAKEN, state: 'settled' }, person('nurse'), []],
		['settled, its raiser', { ...TAKEN, state: 'settled' }, person('therapist'), []],
		['withdrawn, a nurse', { ...RAISED, state: 'withdrawn' }, person('nurse'), []],
		['raised, a nurse of another unit', RAISED, person('nurse', 'nurse', ['gym']), []]
	] as const)('%s', (_, facts, who, moves) => {
		expect(movesFor(facts, who)).toEqual(moves);
	});
});
