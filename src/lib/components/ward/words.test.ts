import { describe, expect, it } from 'vitest';
import { precautionsOf } from '$lib/domain/episodes/precautions';
import { procedureWords, wardBeware } from './words';

const READER = { zone: 'Europe/Dublin', now: Date.parse('2026-03-03T09:00:00Z') };
const STERNOTOMY = { approach: 'sternotomy', day: '2026-03-01', begun: true } as const;
const NOTHING = precautionsOf({ ...STERNOTOMY, approach: 'other' }, null, false);

describe('procedureWords', () => {
	it.each([
		[null, null, 'No operation recorded'],
		['Bypass', '2026-03-04T08:00:00Z', 'before the operation · Bypass'],
		['Bypass', '2026-03-03T08:00:00Z', 'day 0 · Bypass'],
		['Valve', '2026-02-19T08:00:00Z', 'day 12 · Valve']
	])('%s of %s: %s', (procedure, operatedAt, words) => {
		expect(procedureWords({ procedure, operatedAt }, READER)).toBe(words);
	});
});

describe('wardBeware', () => {
	it.each([
		[true, ['rate-slowing drug', 'oxygen: not known']],
		[false, ['oxygen: not known']],
		[null, ['rate-slowing drug: not known', 'oxygen: not known']]
	])('without precautions, drug %s: %j', (betaBlocked, words) => {
		expect(
			wardBeware(
				{ precautions: NOTHING, betaBlocked, nothingByMouth: false, lines: [], oxygen: null },
				READER
			)
		).toEqual(words);
	});

	it('names what may not be taken by mouth before precautions, and those before the drug', () => {
		const precautions = precautionsOf(STERNOTOMY, null, false);
		expect(
			wardBeware(
				{
					precautions,
					betaBlocked: true,
					nothingByMouth: true,
					lines: ['chest-drain'],
					oxygen: { lpm: 2, at: '2026-03-03T08:00:00Z' }
				},
				READER
			)
		).toEqual([
			'Nothing by mouth',
			'Sternal precautions, end due Sun 26 Apr',
			'arms to 45°',
			'rate-slowing drug',
			'oxygen 2 L/min',
			'chest drain'
		]);
	});
});

describe('precautions that nobody knows', () => {
	it.each([
		['none', 'Precautions not known'],
		['planned', 'Precautions begin with the operation']
	] as const)('of %s: %s', (basis, words) => {
		const precautions = { ...NOTHING, basis };
		expect(
			wardBeware({ precautions, betaBlocked: false, nothingByMouth: false, lines: [], oxygen: null }, READER)
		).toEqual([words, 'oxygen: not known']);
	});
});
