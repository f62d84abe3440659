/** A value that is missing is never taken as normal: the rule says that it was not judged, in every set and moment. */
import { describe, expect, it } from 'vitest';
import { SETS, type RuleId, type SetName } from '../codes';
import { grades, judge, REST, type Changes, type ReadingField } from '../testing/sample';

/** Rules on one value, wherever it was to be measured. */
const OF_A_VALUE: [field: ReadingField, rule: RuleId][] = [
	['hr', 'heart-rate-ceiling'],
	['hr', 'heart-rate-floor'],
	['sbp', 'systolic-ceiling'],
	['sbp', 'systolic-floor'],
	['sbp', 'mean-floor'],
	['dbp', 'mean-floor'],
	['dbp', 'diastolic-ceiling'],
	['spo2', 'saturation-floor'],
	['rr', 'respiratory-ceiling'],
	['pain', 'pain-ceiling']
];
/** Rules on a change, with the sets that have them. */
const OF_A_CHANGE: [field: ReadingField, rule: RuleId, sets: readonly SetName[]][] = [
	['sbp', 'systolic-fall', SETS],
	['sbp', 'systolic-rise', ['strict']],
	['hr', 'heart-rate-rise', ['strict', 'guideline']],
	['spo2', 'saturation-fall', SETS]
];

describe.each(SETS)('what is missing, in the set %s', (set) => {
	const judged = (changes: Changes) => judge({ ...changes, context: { set } });

	it.each(OF_A_VALUE)('%s leaves %s unjudged, before as after', (field, rule) => {
		expect(judged({}).notJudged).not.toContain(rule);
		for (const moment of ['before', 'after'] as const) {
			const verdict = judged({ [moment]: { [field]: null } });
			expect(verdict.notJudged).toContain(rule);
			expect(grades(verdict, rule)).toEqual([]);
		}
	});

	it.each(OF_A_CHANGE)('%s leaves %s unjudged where the set has it', (field, rule, sets) => {
		expect(judged({ during: [] }).notJudged).not.toContain(rule);
		for (const moment of ['before', 'after'] as const) {
			const verdict = judged({ during: [], [moment]: { [field]: null } });
			expect(verdict.notJudged.includes(rule)).toBe(sets.includes(set));
			expect(grades(verdict, rule)).toEqual([]);
		}
	});

	it('exertion is asked for once, in effort or after it', () => {
		expect(judged({ during: [REST] }).notJudged).toContain('exertion-ceiling');
		expect(judged({ during: [REST], after: { rpe: 11 } }).notJudged).not.toContain('exertion-ceiling');
	});
});
