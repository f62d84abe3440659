import { describe, expect, it } from 'vitest';
import { MINUTE } from '../core/time';
import { firstClash, overlap, type Held } from './room';

const at = (minute: number, minutes = 60) => ({ startsAt: minute * MINUTE, minutes });
const held = (minute: number, minutes = 60, who = 'other', unitId = 'gym'): Held => ({
	...at(minute, minutes),
	patientId: who,
	unitId
});
const wanted = (visits = [at(600)], places: number | null = 2) => ({
	patientId: 'own',
	unitId: 'gym',
	places,
	visits
});

describe('overlap', () => {
	it.each([
		['ends as the other begins', at(540), false],
		['ends a minute into the other', at(541), true],
		['is the same', at(600), true],
		['lies within', at(610, 10), true],
		['surrounds it', at(500, 240), true],
		['begins a minute before its end', at(659), true],
		['begins as it ends', at(660), false]
	])('one that %s', (_, other, expected) => {
		expect(overlap(at(600), other)).toBe(expected);
		expect(overlap(other, at(600))).toBe(expected);
	});
});

describe('room for a visit', () => {
	it.each<[string, Held[], string | null]>([
		['an empty gym', [], null],
		['one place left', [held(600)], null],
		['no place left', [held(600), held(600)], 'full'],
		['two who come one after the other', [held(570, 30), held(600, 30), held(630, 30)], null],
		['two who are there together for a minute', [held(600, 31), held(630, 30)], 'full'],
		['a full gym elsewhere', [held(600, 60, 'a', 'ward'), held(600, 60, 'b', 'ward')], null],
		['a visit of their own', [held(659, 60, 'own')], 'overlaps'],
		['a visit of their own elsewhere', [held(659, 60, 'own', 'ward')], 'overlaps'],
		['a visit of their own right after it', [held(660, 60, 'own')], null]
	])('beside %s', (_, others, clash) => {
		expect(firstClash(wanted(), others)?.kind ?? null).toBe(clash);
	});

	it('of a series is named for the first one without it', () => {
		const visits = [at(600), at(2040), at(3480)];
		const clash = firstClash(wanted(visits, 1), [held(3480), held(2040)]);
		expect(clash).toEqual({ kind: 'full', wanted: at(2040), taken: 1 });
	});

	it('is never wanting where nobody has said how many there are', () => {
		expect(
			firstClash(
				wanted([at(600)], null),
				Array.from({ length: 40 }, () => held(600))
			)
		).toBeNull();
	});

	it.each([1, 2, 6])('where %d are there already, one more place is needed', (count) => {
		const others = Array.from({ length: count }, (_, index) => held(600, 60, `p${index}`));
		expect(firstClash(wanted([at(600)], count), others)).toMatchObject({ kind: 'full', taken: count });
		expect(firstClash(wanted([at(600)], count + 1), others)).toBeNull();
	});
});
