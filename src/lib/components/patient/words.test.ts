import { describe, expect, it } from 'vitest';
import type { Precautions } from '$lib/domain/episodes/precautions';
import { bewareWords, dayWords, findingWords, heartWords, outcomeWords } from './words';
import { DOT } from '$lib/format';

const reader = (now: string) => ({ zone: 'Europe/Dublin', now: Date.parse(now) });

describe('heartWords', () => {
	it.each([
		[true, 'sinus', 'rate-slowing drug · sinus'],
		[false, 'atrial-fibrillation', 'no rate-slowing drug · atrial fibrillation'],
		[null, 'paced', 'rate-slowing drug: not known · paced'],
		[true, null, 'rate-slowing drug · rhythm: not known'],
		[true, 'unheard of', 'rate-slowing drug · rhythm: not known']
	])('%s and %s: %s', (drug, rhythm, words) => {
		expect(heartWords(drug, rhythm).split(DOT).join(' · ')).toBe(words);
	});
});

describe('the words of a stop', () => {
	it.each([
		['stop', 'before', 'do not start', 'do not start'],
		['stop', 'during', 'stop', 'stop'],
		['stop', 'after', 'stop', 'stop'],
		['caution', 'before', 'caution', 'caution']
	] as const)('a %s %s: %s, and the session: %s', (grade, reading, words, ofSession) => {
		expect(findingWords({ grade, reading })).toBe(words);
		expect(outcomeWords(grade, [{ grade, reading }])).toBe(ofSession);
	});
});

describe('dayWords', () => {
	it.each([
		['2026-03-01T10:00:00.000Z', '2026-03-03T09:00:00Z', 'day 2'],
		['2026-03-01T10:00:00.000Z', '2026-03-03T23:59:59Z', 'day 2'],
		['2026-03-01T10:00:00.000Z', '2026-03-04T00:00:00Z', 'day 3'],
		['2026-03-05T10:00:00.000Z', '2026-03-03T09:00:00Z', 'before the operation'],
		[null, '2026-03-03T09:00:00Z', 'No operation recorded']
	])('operated at %s, read at %s: %s', (operatedAt, now, words) => {
		expect(dayWords({ operatedAt }, reader(now))).toBe(words);
	});
});

describe('bewareWords', () => {
	const NO_FIGURES = { maxElevationDeg: null, maxLoadKg: null, armStage: null };
	const sternal: Precautions = {
		basis: 'performed',
		sternal: true,
		endDue: '2026-04-26',
		maxElevationDeg: 45,
		maxLoadKg: null,
		armStage: null
	};
	it.each<[string, Precautions, string[]]>([
		['2026-04-25T22:59:59Z', sternal, ['Sternal precautions, end due Sun 26 Apr', 'arms to 45°']],
		['2026-04-26T22:59:59Z', sternal, ['Sternal precautions, end due Sun 26 Apr', 'arms to 45°']],
		['2026-04-26T23:00:00Z', sternal, ['Sternal precautions, end was due Sun 26 Apr', 'arms to 45°']],
		[
			'2026-03-03T09:00:00Z',
			{ basis: 'performed', sternal: false, endDue: null, ...NO_FIGURES },
			['No sternal precautions']
		],
		[
			'2026-03-03T09:00:00Z',
			{ basis: 'planned', sternal: false, endDue: null, ...NO_FIGURES },
			['Precautions begin with the operation']
		],
		[
			'2026-03-03T09:00:00Z',
			{ basis: 'none', sternal: false, endDue: null, ...NO_FIGURES },
			['Precautions not known']
		]
	])('at %s of %j: %j', (now, precautions, words) => {
		expect(bewareWords(precautions, reader(now))).toEqual(words);
	});
});
