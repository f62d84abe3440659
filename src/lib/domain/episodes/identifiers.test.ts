import { describe, expect, it } from 'vitest';
import { isSameName, normaliseName, numberKey, spellingKey, written } from './identifiers';

describe('hospital numbers and beds', () => {
	it.each([
		['T9', 'T9', 'T9'],
		['t9 ', 't9', 'T9'],
		[' t  9', 't 9', 'T9'],
		['t\u00a09', 't 9', 'T9'],
		['t\u200b9', 't9', 'T9'],
		['Ｔ９', 'T9', 'T9'],
		['s-1042', 's-1042', 'S-1042'],
		['  ', '', '']
	])('%j is stored as %j and compared as %j', (typed, stored, key) => {
		expect([written(typed), spellingKey(typed)]).toEqual([stored, key]);
	});

	it('keeps what tells one from another', () => {
		expect(new Set(['T1', 'T10', 'T-1', 'T01', 'I1'].map(spellingKey)).size).toBe(5);
	});
});

describe('a hospital number', () => {
	it.each(['SG-40098', 'sg40098', ' SG 40098', 'sg/40.098'])('%j is one', (typed) => {
		expect(numberKey(typed)).toBe('SG40098');
	});

	it('is another with another digit', () => {
		expect(numberKey('SG-40089')).not.toBe(numberKey('SG-40098'));
	});
});

describe('names', () => {
	it('are stored without doubled spaces', () => {
		expect(normaliseName('  Ide \t Quillfeather ')).toBe('Ide Quillfeather');
	});

	it.each([
		['Ide Quillfeather', 'ide  quillfeather ', true],
		['Zo\u00eb Marsh', 'Zoe\u0308 Marsh', true],
		['Ide Quillfeather', 'Ide Quillfeathers', false],
		['Ide Quillfeather', 'Quillfeather Ide', false]
	])('%j and %j: one name is %s', (a, b, same) => {
		expect(isSameName(a, b)).toBe(same);
	});
});
