import { describe, expect, it } from 'vitest';
import type { SetName } from '../codes';
import type { Reading } from '../forms';
import { grades, judge, only, REST } from '../testing/sample';

/*
 * Systolic, a fall of over 10 mmHg with rising work: American Family Physician 2017, reasons to end a stress test
 * (published). Heart rate, a fall of over 10: common practice, no published source. Caution from 80 % of a limit on in
 * the strict set: common practice, no published source.
 */

type Grade = 'stop' | 'caution' | null;

const RULES = [
	['systolic-stage-fall', 'sbp', 150],
	['heart-rate-fall', 'hr', 100]
] as const;

describe.each(RULES)('%s', (rule, field, start) => {
	const at = (value: number, work: number | undefined, more: Reading = {}): Reading => ({
		...REST,
		[field]: value,
		work,
		...more
	});
	const found = (during: Reading[], set: SetName = 'strict') =>
		grades(judge({ context: { set }, during }), rule);

	it.each<[SetName, number, Grade]>([
		['strict', 7.9, null],
		['strict', 8, 'caution'],
		['strict', 10, 'caution'],
		['strict', 10.1, 'stop'],
		['guideline', 8, null],
		['guideline', 10, null],
		['guideline', 10.1, 'stop'],
		['outpatient', 10, null],
		['outpatient', 10.1, 'stop']
	])('%s: a fall of %d while the work rises: %s', (set, fall, grade) => {
		const during = [at(start, 1), at(start - fall, 2)];
		expect(found(during, set)).toEqual(grade === null ? [] : [`${grade} during`]);
	});

	it.each<[string, Reading[], string[]]>([
		['the work holds', [at(start, 2), at(start - 20, 2)], []],
		['the work falls', [at(start, 2), at(start - 20, 1)], []],
		['the work of one is not stated', [at(start, 1), at(start - 20, undefined)], []],
		['the fall comes in small steps', [at(start, 1), at(start - 6, 2), at(start - 12, 3)], ['stop during']],
		['a rest lies between', [at(start, 1), at(start - 30, 0), at(start - 12, 2)], ['stop during']],
		['the posture changed', [at(start, 1), at(start - 20, 2, { posture: 'standing' })], []]
	])('when %s: %j', (_what, during, expected) => {
		expect(found(during)).toEqual(expected);
	});

	it('is not judged without two readings of rising work', () => {
		for (const during of [[], [at(start, 1)], [at(start, undefined), at(start, undefined)]]) {
			expect(judge({ during }).notJudged).toContain(rule);
		}
		expect(judge({ during: [at(start, 1), at(start, 2)] }).notJudged).not.toContain(rule);
	});
});

it('compares pressures of one source, heart rates of any', () => {
	const during: Reading[] = [
		{ ...REST, sbp: 150, hr: 100, work: 1, bpSource: 'cuff' },
		{ ...REST, sbp: 130, hr: 85, work: 2, bpSource: 'arterial' }
	];
	const verdict = judge({ during });
	expect(grades(verdict, 'systolic-stage-fall')).toEqual([]);
	expect(verdict.notJudged).toContain('systolic-stage-fall');
	expect(grades(verdict, 'heart-rate-fall')).toEqual(['stop during']);
});

it('says over which work the value fell', () => {
	const during: Reading[] = [
		{ ...REST, sbp: 150, work: 25 },
		{ ...REST, sbp: 136, work: 50 }
	];
	expect(only(judge({ during }), 'systolic-stage-fall').reason).toBe(
		'The systolic pressure fell by 14 mmHg, from 150 to 136, while the work rose from 25 to 50: more than the limit of 10.'
	);
});
