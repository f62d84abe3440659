/** The absolute rules beside their limits; each limit on its three sides, in every set, stands in `edges`. */
import { describe, expect, it } from 'vitest';
import type { RuleId } from '../codes';
import { grades, judge, only, REST, type ReadingField } from '../testing/sample';

type Grade = 'stop' | 'caution' | null;
type Case = [rule: RuleId, field: ReadingField, value: number, grade: Grade];

const expected = (grade: Grade, moment: string) => (grade === null ? [] : [`${grade} ${moment}`]);

describe('mean-floor', () => {
	// Mean pressure = diastolic + (systolic - diastolic) / 3; 120/80 is 93.33 (Mean arterial pressure, WikiLectures, secondary).
	// The floor of 60: early mobilisation in intensive care, published.
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
