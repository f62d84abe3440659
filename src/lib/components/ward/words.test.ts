import { describe, expect, it } from 'vitest';
import { precautionsOf } from '$lib/domain/episodes/precautions';
import type { EpisodeListItem } from '$lib/domain/episodes/views';
import { bewareWords, escalationWords, procedureWords } from './words';

const READER = { zone: 'Europe/Dublin', now: Date.parse('2026-03-03T09:00:00Z') };
const STERNOTOMY = { approach: 'sternotomy', day: '2026-03-01' } as const;

const item = (rest: Partial<EpisodeListItem>) => rest as EpisodeListItem;

describe('procedureWords', () => {
	it.each([
		[null, null, 'no operation yet'],
		['Bypass', null, 'Bypass planned'],
		['Bypass', 0, 'Bypass, day 0'],
		['Valve', 12, 'Valve, day 12']
	])('%s, day %s: %s', (procedure, postOpDay, words) => {
		expect(procedureWords(item({ procedure, postOpDay }))).toBe(words);
	});
});

describe('bewareWords', () => {
	it.each([
		[true, 'arms to 45°, precautions: ask about ending them Sun 26 Apr, rate-slowing drug'],
		[false, 'arms to 45°, precautions: ask about ending them Sun 26 Apr'],
		[null, 'arms to 45°, precautions: ask about ending them Sun 26 Apr, rate-slowing drug: not known']
	])('after a sternotomy, drug %s: %s', (betaBlocked, words) => {
		const precautions = precautionsOf(STERNOTOMY, null, false);
		expect(bewareWords(item({ precautions, betaBlocked }), READER).join(', ')).toBe(words);
	});

	it('say nothing where there is nothing to beware of', () => {
		const precautions = precautionsOf(null, null, false);
		expect(bewareWords(item({ precautions, betaBlocked: false }), READER)).toEqual([]);
	});

	it('give the limit of a cleared arm stage', () => {
		const precautions = precautionsOf(STERNOTOMY, { maxElevationDeg: 90 }, false);
		expect(bewareWords(item({ precautions, betaBlocked: false }), READER)[0]).toBe('arms to 90°');
	});
});

describe('escalationWords', () => {
	it.each([
		['raised', null, ', nobody has it'],
		['taken', 'R. Ferris', ', taken by R. Ferris']
	] as const)('%s by %s: %s', (state, takenBy, words) => {
		expect(escalationWords({ id: 'x', grade: 'high', state, takenBy })).toBe(words);
	});
});
