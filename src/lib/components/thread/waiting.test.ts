import { describe, expect, it } from 'vitest';
import type { Person } from '$lib/domain/access/actor';
import type { Role } from '$lib/domain/core/codes';
import { anyRole, waitingWords, waitsOn } from './waiting';

const person = (role: Role, unitIds = ['ward']): Person => ({
	kind: 'person',
	id: 'p1',
	name: 'N',
	role,
	unitIds
});
const arm = { kind: 'clearance', code: 'arm-stage' } as const;
const stairs = { kind: 'clearance', code: 'stairs' } as const;
const physio = { kind: 'referral', code: 'physiotherapy' } as const;

describe('waitsOn', () => {
	it.each([
		[person('surgeon'), arm, true],
		[person('physician'), arm, false],
		[person('physician'), stairs, true],
		[person('therapist'), physio, true],
		[person('nurse'), physio, false],
		[person('surgeon', ['elsewhere']), arm, false]
	])('%j, %j: %s', (viewer, owed, mine) => {
		expect(waitsOn(viewer, owed, 'ward')).toBe(mine);
	});
});

describe('waitingWords', () => {
	const words = (since: string, viewer = person('nurse')) =>
		waitingWords(stairs, since, { viewer, unitId: 'ward', now: Date.parse('2026-03-03T09:00:00Z') });

	it.each([
		['2026-03-03T08:59:01Z', 'waiting on the surgeon or physician, just now'],
		['2026-03-03T08:59:00Z', 'waiting on the surgeon or physician, 1 min'],
		['2026-03-03T08:20:30Z', 'waiting on the surgeon or physician, 39 min'],
		['2026-03-03T06:50:00Z', 'waiting on the surgeon or physician, 2 h 10']
	])('since %s: %s', (since, expected) => {
		expect(words(since)).toBe(expected);
	});

	it('names the reader as you', () => {
		expect(words('2026-03-03T08:20:00Z', person('physician'))).toBe('waiting on you, 40 min');
	});
});

describe('anyRole', () => {
	it.each<[Role[], string]>([
		[['surgeon'], 'surgeon'],
		[['surgeon', 'physician', 'nurse'], 'surgeon, physician or nurse']
	])('%j: %s', (roles, words) => {
		expect(anyRole(roles)).toBe(words);
	});
});
