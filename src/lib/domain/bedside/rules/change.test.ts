import { describe, expect, it } from 'vitest';
import type { SetName } from '../codes';
import type { Reading } from '../forms';
import { grades, judge, only, REST } from '../testing/sample';

/*
 * Systolic, a fall of over 10: O'Sullivan, Schmitz and Fulk (from memory) in the strict set, study notes of the inpatient
 * line (secondary) in the guideline set, American Family Physician 2017 (published) for outpatients. A rise of over 30, and
 * a heart rate over 20 or on a rate-slowing drug over 12: the same textbook (from memory); over 30: the inpatient line
 * (secondary). Caution from 80 % of a limit in the strict set: common practice, no published source.
 */

type Grade = 'stop' | 'caution' | null;
const expected = (grade: Grade, moment = 'after') => (grade === null ? [] : [`${grade} ${moment}`]);

/** One change from a base of 120 systolic and 70 beats, measured after effort. */
function afterChange(set: SetName, betaBlocked: boolean | null, before: Reading, after: Reading) {
	return judge({ context: { set, betaBlocked }, before, after: { ...before, ...after }, during: [] });
}

describe('systolic-fall', () => {
	it.each<[SetName, number, Grade]>([
		['strict', 7.9, null],
		['strict', 8, 'caution'],
		['strict', 10, 'caution'],
		['strict', 10.1, 'stop'],
		['strict', 11, 'stop'],
		['guideline', 8, null],
		['guideline', 10, null],
		['guideline', 10.1, 'stop'],
		['outpatient', 10, null],
		['outpatient', 10.1, 'stop']
	])('%s: a fall of %d: %s', (set, fall, grade) => {
		const verdict = afterChange(set, false, { ...REST, sbp: 125 }, { sbp: 125 - fall });
		expect(grades(verdict, 'systolic-fall')).toEqual(expected(grade));
		expect(grade === null ? fall : only(verdict, 'systolic-fall').measured).toBe(fall);
	});
});

describe('systolic-rise', () => {
	it.each<[SetName, number, Grade]>([
		['strict', 23.9, null],
		['strict', 24, 'caution'],
		['strict', 30, 'caution'],
		['strict', 30.1, 'stop'],
		['strict', 31, 'stop'],
		['guideline', 60, null],
		['outpatient', 60, null]
	])('%s: a rise of %d: %s', (set, rise, grade) => {
		const verdict = afterChange(set, false, { ...REST, sbp: 110 }, { sbp: 110 + rise });
		expect(grades(verdict, 'systolic-rise')).toEqual(expected(grade));
		expect(verdict.notJudged).not.toContain('systolic-rise');
	});

	it('is switched off, not unjudged, in the sets without it', () => {
		expect(judge({ context: { set: 'guideline' }, after: { sbp: null } }).notJudged).not.toContain(
			'systolic-rise'
		);
		expect(judge({ after: { sbp: null } }).notJudged).toContain('systolic-rise');
	});
});

describe('heart-rate-rise', () => {
	it.each<[SetName, boolean | null, number, Grade]>([
		['strict', false, 15.9, null],
		['strict', false, 16, 'caution'],
		['strict', false, 20, 'caution'],
		['strict', false, 20.1, 'stop'],
		['strict', true, 9.5, null],
		// 80 % of 12 is 9.6, which binary fractions miss: 79.6 - 70 falls just short of it.
		['strict', true, 9.6, 'caution'],
		['strict', true, 12, 'caution'],
		['strict', true, 12.1, 'stop'],
		['strict', null, 9.5, null],
		['strict', null, 9.6, 'caution'],
		['strict', null, 12.1, 'stop'],
		['guideline', false, 30, null],
		['guideline', false, 30.1, 'stop'],
		['guideline', true, 30, null],
		['guideline', true, 30.1, 'stop'],
		['outpatient', false, 50, null]
	])('%s, rate-slowing drug %s: a rise of %d: %s', (set, betaBlocked, rise, grade) => {
		for (const base of [60, 70, 71.3]) {
			const verdict = afterChange(set, betaBlocked, { ...REST, hr: base }, { hr: base + rise });
			expect(grades(verdict, 'heart-rate-rise')).toEqual(expected(grade));
		}
	});

	// Common practice, no published source.
	it.each<[boolean, number, number, Grade]>([
		[true, 70, 82, 'caution'],
		[true, 70, 83, 'stop'],
		[true, 70, 86, 'stop'],
		[false, 70, 90, 'caution'],
		[false, 70, 105, 'stop']
	])('rate-slowing drug %s: a pulse from %d to %d: %s', (betaBlocked, from, to, grade) => {
		const verdict = afterChange('strict', betaBlocked, { ...REST, hr: from }, { hr: to });
		expect(grades(verdict, 'heart-rate-rise')).toEqual(expected(grade));
	});

	it.each(['atrial-fibrillation', 'paced', 'other'] as const)('cautions at most in %s', (rhythm) => {
		const at = (hr: number) =>
			grades(
				judge({ context: { rhythm }, before: { hr: 70 }, during: [], after: { hr } }),
				'heart-rate-rise'
			);
		expect([at(85), at(86), at(91), at(120)]).toEqual([
			[],
			['caution after'],
			['caution after'],
			['caution after']
		]);
	});

	it('keeps the limit it used in the finding, and names 80 % of it', () => {
		const verdict = afterChange('strict', true, { ...REST, hr: 70 }, { hr: 80 });
		expect(only(verdict, 'heart-rate-rise')).toMatchObject({
			grade: 'caution',
			measured: 10,
			limit: 12,
			unit: 'beats/min',
			reason:
				'The heart rate rose by 10 beats/min, from 70 before the session to 80 after effort: near the limit of 12, with caution from 9.6.',
			source:
				"O'Sullivan, Schmitz and Fulk, Physical Rehabilitation, chapter on heart disease (from memory, not yet verified)"
		});
	});
});

describe('saturation-fall', () => {
	// AARC exercise oximetry protocol: a fall of 4 points counts as significant.
	it.each<[number, Grade]>([
		[3.2, null],
		[3.9, null],
		[4, 'caution'],
		[5, 'caution'],
		[12, 'caution']
	])('a fall of %d points in every set: %s', (fall, grade) => {
		for (const set of ['strict', 'guideline', 'outpatient'] as const) {
			const verdict = judge({
				context: { set },
				before: { spo2: 100 },
				after: { spo2: 100 - fall },
				during: []
			});
			expect(grades(verdict, 'saturation-fall')).toEqual(expected(grade));
		}
	});
});

describe('several readings in effort', () => {
	it('give one finding, the greatest change of the gravest grade', () => {
		const during = [111, 108, 112].map((sbp) => ({ ...REST, sbp }));
		expect(only(judge({ during }), 'systolic-fall')).toMatchObject({ grade: 'stop', measured: 12 });
	});

	it('let a lesser rise in sinus rhythm stop although a greater one in fibrillation cautions', () => {
		const during: Reading[] = [
			{ ...REST, hr: 100 },
			{ ...REST, hr: 118, rhythm: 'atrial-fibrillation' }
		];
		expect(only(judge({ during }), 'heart-rate-rise')).toMatchObject({ grade: 'stop', measured: 22 });
	});
});
