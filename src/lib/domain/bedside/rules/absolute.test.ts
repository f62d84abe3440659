import { describe, expect, it } from 'vitest';
import type { RuleId, SetName } from '../codes';
import type { Reading } from '../forms';
import { grades, judge, only, REST } from '../testing/sample';

type Grade = 'stop' | 'caution' | null;
type Field = 'hr' | 'sbp' | 'dbp' | 'spo2' | 'rr' | 'rpe' | 'pain';
type Case = [rule: RuleId, field: Field, value: number, grade: Grade];

/** A reading with one value changed, and the other pressure moved so that the pair stays possible. */
function reading(field: Field, value: number): Reading {
	if (field === 'sbp') {
		return { ...REST, sbp: value, dbp: Math.min(72, value - 1) };
	}
	return { ...REST, [field]: value, ...(field === 'dbp' ? { sbp: Math.max(120, value + 10) } : {}) };
}

const EVERY_SET: SetName[] = ['strict', 'guideline', 'outpatient'];

/** Values just under, at and just over each limit before a start; the same in all three sets. */
const BEFORE: Case[] = [
	['systolic-ceiling', 'sbp', 179.9, null],
	['systolic-ceiling', 'sbp', 180, null],
	['systolic-ceiling', 'sbp', 180.1, 'stop'],
	['systolic-floor', 'sbp', 89.9, 'stop'],
	['systolic-floor', 'sbp', 90, null],
	['diastolic-ceiling', 'dbp', 99.9, null],
	['diastolic-ceiling', 'dbp', 100, 'caution'],
	['diastolic-ceiling', 'dbp', 109.9, 'caution'],
	['diastolic-ceiling', 'dbp', 110, 'stop'],
	['heart-rate-ceiling', 'hr', 120, null],
	['heart-rate-ceiling', 'hr', 120.1, 'stop'],
	['heart-rate-floor', 'hr', 39.9, 'stop'],
	['heart-rate-floor', 'hr', 40, 'caution'],
	['heart-rate-floor', 'hr', 49.9, 'caution'],
	['heart-rate-floor', 'hr', 50, null],
	['respiratory-ceiling', 'rr', 24, null],
	['respiratory-ceiling', 'rr', 24.1, 'caution'],
	['respiratory-ceiling', 'rr', 30, 'caution'],
	['respiratory-ceiling', 'rr', 30.1, 'stop'],
	['saturation-floor', 'spo2', 87.9, 'stop'],
	['saturation-floor', 'spo2', 88, 'caution'],
	['saturation-floor', 'spo2', 89.9, 'caution'],
	['saturation-floor', 'spo2', 90, null],
	['exertion-ceiling', 'rpe', 20, null],
	['pain-ceiling', 'pain', 3.9, null],
	['pain-ceiling', 'pain', 4, 'caution'],
	['pain-ceiling', 'pain', 6.9, 'caution'],
	['pain-ceiling', 'pain', 7, 'stop']
];

/** The limits in effort and after it that all three sets share. */
const EFFORT: Case[] = [
	['systolic-floor', 'sbp', 89.9, 'stop'],
	['systolic-floor', 'sbp', 90, null],
	['diastolic-ceiling', 'dbp', 99.9, null],
	['diastolic-ceiling', 'dbp', 100, 'caution'],
	['diastolic-ceiling', 'dbp', 109.9, 'caution'],
	['heart-rate-ceiling', 'hr', 120, null],
	['heart-rate-ceiling', 'hr', 120.1, 'caution'],
	['heart-rate-ceiling', 'hr', 130, 'caution'],
	['heart-rate-ceiling', 'hr', 130.1, 'stop'],
	['heart-rate-floor', 'hr', 39.9, 'stop'],
	['heart-rate-floor', 'hr', 40, 'caution'],
	['heart-rate-floor', 'hr', 50, null],
	['respiratory-ceiling', 'rr', 30, null],
	['respiratory-ceiling', 'rr', 30.1, 'caution'],
	['respiratory-ceiling', 'rr', 35, 'caution'],
	['respiratory-ceiling', 'rr', 35.1, 'stop'],
	['saturation-floor', 'spo2', 87.9, 'stop'],
	['saturation-floor', 'spo2', 88, 'caution'],
	['saturation-floor', 'spo2', 90, null],
	['exertion-ceiling', 'rpe', 13, null],
	['exertion-ceiling', 'rpe', 13.1, 'caution'],
	['exertion-ceiling', 'rpe', 15, 'caution'],
	['exertion-ceiling', 'rpe', 15.1, 'stop'],
	['pain-ceiling', 'pain', 4, 'caution'],
	['pain-ceiling', 'pain', 7, 'stop']
];

/** The pressures on which the sets differ in effort and after it. */
const PRESSURES: [SetName[], ...Case][] = [
	[['strict', 'guideline'], 'systolic-ceiling', 'sbp', 180, null],
	[['strict', 'guideline'], 'systolic-ceiling', 'sbp', 180.1, 'caution'],
	[['strict', 'guideline'], 'systolic-ceiling', 'sbp', 200, 'caution'],
	[['strict', 'guideline'], 'systolic-ceiling', 'sbp', 200.1, 'stop'],
	[['strict', 'guideline'], 'diastolic-ceiling', 'dbp', 110, 'stop'],
	[['outpatient'], 'systolic-ceiling', 'sbp', 220, null],
	[['outpatient'], 'systolic-ceiling', 'sbp', 220.1, 'caution'],
	[['outpatient'], 'systolic-ceiling', 'sbp', 250, 'caution'],
	[['outpatient'], 'systolic-ceiling', 'sbp', 250.1, 'stop'],
	[['outpatient'], 'diastolic-ceiling', 'dbp', 110, 'caution'],
	[['outpatient'], 'diastolic-ceiling', 'dbp', 115, 'caution'],
	[['outpatient'], 'diastolic-ceiling', 'dbp', 115.1, 'stop']
];

const expected = (grade: Grade, moment: string) => (grade === null ? [] : [`${grade} ${moment}`]);

describe.each(EVERY_SET)('absolute rules of the %s set', (set) => {
	it.each(BEFORE)('%s: %s %d before a start: %s', (rule, field, value, grade) => {
		const verdict = judge({ context: { set }, before: reading(field, value) });
		expect(grades(verdict, rule).filter((found) => found.endsWith('before'))).toEqual(
			expected(grade, 'before')
		);
	});

	const effort = [...EFFORT, ...PRESSURES.filter(([sets]) => sets.includes(set)).map(([, ...row]) => row)];

	it.each(effort)('%s: %s %d in effort: %s', (rule, field, value, grade) => {
		const verdict = judge({ context: { set }, during: [reading(field, value)] });
		expect(grades(verdict, rule)).toEqual(expected(grade, 'during'));
	});

	it.each(effort)('%s: %s %d after effort: %s', (rule, field, value, grade) => {
		const verdict = judge({ context: { set }, after: reading(field, value) });
		expect(grades(verdict, rule)).toEqual(expected(grade, 'after'));
	});
});

describe('mean-floor', () => {
	// Mean pressure = diastolic + (systolic - diastolic) / 3; 120/80 is 93.33 (Mean arterial pressure, WikiLectures).
	it.each([
		[100, 40, 60, null],
		[99.9, 40, 59.967, 'stop'],
		[100, 39.9, 59.933, 'stop'],
		[90, 45, 60, null],
		[92, 43.9, 59.933, 'stop']
	])('%d/%d has a mean of %d: %s', (sbp, dbp, mean, grade) => {
		for (const moment of ['before', 'after'] as const) {
			const verdict = judge({ [moment]: { ...REST, sbp, dbp } });
			expect(grades(verdict, 'mean-floor')).toEqual(expected(grade as Grade, moment));
			expect(grade === null ? mean : only(verdict, 'mean-floor').measured).toBeCloseTo(mean, 3);
		}
	});

	it.each(['sbp', 'dbp'])('is not judged without the %s', (field) => {
		const verdict = judge({ after: { ...REST, sbp: 70, dbp: 40, [field]: null } });
		expect(verdict.notJudged).toContain('mean-floor');
		expect(grades(verdict, 'mean-floor')).toEqual([]);
	});
});

describe('the prescribed range of an outpatient', () => {
	const prescribed = { hrMin: 90, hrMax: 118, rpeMin: 11, rpeMax: 14 };

	it.each([
		['heart-rate-ceiling', 'hr', 118, null],
		['heart-rate-ceiling', 'hr', 118.1, 'stop'],
		['exertion-ceiling', 'rpe', 14, null],
		['exertion-ceiling', 'rpe', 14.1, 'caution'],
		['exertion-ceiling', 'rpe', 16, 'caution'],
		['exertion-ceiling', 'rpe', 16.1, 'stop']
	] as Case[])('%s: %s %d in effort: %s', (rule, field, value, grade) => {
		const verdict = judge({
			context: { phase: 'outpatient', prescribed },
			during: [{ ...REST, [field]: value }]
		});
		expect(grades(verdict, rule)).toEqual(expected(grade, 'during'));
	});

	it('names itself as the limit and the source', () => {
		const verdict = judge({ context: { phase: 'outpatient', prescribed }, after: { hr: 125 } });
		expect(only(verdict, 'heart-rate-ceiling')).toMatchObject({
			limit: 118,
			source: 'range prescribed for this patient'
		});
	});

	it('may lie above the general ceiling', () => {
		const context = { phase: 'outpatient', prescribed: { hrMax: 140 } } as const;
		expect(grades(judge({ context, after: { hr: 140 } }), 'heart-rate-ceiling')).toEqual(['caution after']);
		expect(grades(judge({ context, after: { hr: 140.1 } }), 'heart-rate-ceiling')).toEqual(['stop after']);
	});

	it('leaves the general ceiling where an end is open', () => {
		const context = { phase: 'outpatient', prescribed: { rpeMax: 14 } } as const;
		expect(grades(judge({ context, after: { hr: 130.1 } }), 'heart-rate-ceiling')).toEqual(['stop after']);
	});

	it('says nothing in hospital', () => {
		const verdict = judge({ context: { prescribed }, after: { hr: 119 } });
		expect(grades(verdict, 'heart-rate-ceiling')).toEqual([]);
	});

	it('gives way to a lower limit set for the patient, and not to a higher one', () => {
		const at = (limit: number) =>
			only(
				judge({
					context: { phase: 'outpatient', prescribed, limits: { 'heart-rate-ceiling': limit } },
					after: { hr: 126 }
				}),
				'heart-rate-ceiling'
			).limit;
		expect([at(110), at(125)]).toEqual([110, 118]);
	});
});

describe('several readings in effort', () => {
	it('give one finding, that of the worst', () => {
		const during = [185, 210, 190].map((sbp) => ({ ...REST, sbp }));
		expect(only(judge({ during }), 'systolic-ceiling')).toMatchObject({
			grade: 'stop',
			measured: 210,
			limit: 200
		});
	});

	it('look for the lowest where the limit is a floor', () => {
		const during = [89, 86, 91].map((spo2) => ({ ...REST, spo2 }));
		expect(only(judge({ during }), 'saturation-floor')).toMatchObject({ grade: 'stop', measured: 86 });
	});
});

it('says what was measured, where, and against which limit', () => {
	// Rest at 84/50 is 'do not start': common practice, no published source.
	const verdict = judge({ before: { sbp: 84, dbp: 50 } });
	expect(only(verdict, 'systolic-floor')).toEqual({
		rule: 'systolic-floor',
		grade: 'stop',
		reading: 'before',
		measured: 84,
		limit: 90,
		unit: 'mmHg',
		reason: 'Do not start: the systolic pressure before the session is 84 mmHg, under the limit of 90.',
		source: 'Critical Care Research and Practice 2020, early mobilisation in intensive care, tables 5 and 6',
		set: 'strict',
		version: '2'
	});
	expect(verdict.outcome).toBe('stop');
});

describe('what is missing', () => {
	it.each([
		['spo2', 'saturation-floor'],
		['rr', 'respiratory-ceiling'],
		['pain', 'pain-ceiling'],
		['hr', 'heart-rate-ceiling'],
		['sbp', 'systolic-ceiling'],
		['dbp', 'diastolic-ceiling']
	] as const)('%s leaves %s unjudged, before as after', (field, rule) => {
		expect(judge({ before: { [field]: null } }).notJudged).toContain(rule);
		expect(judge({ after: { [field]: null } }).notJudged).toContain(rule);
	});

	it('exertion is asked for once, in effort or after it', () => {
		expect(judge({ during: [REST] }).notJudged).toContain('exertion-ceiling');
		expect(judge({ during: [REST], after: { rpe: 11 } }).notJudged).not.toContain('exertion-ceiling');
	});
});
