/** What the property tests share: how grave a verdict is by rule, and which way of a value is worse for which rule. */
import { expect } from 'vitest';
import { FINDING_GRADES, type RuleId } from '../codes';
import type { Finding, Verdict } from '../finding';
import type { Reading } from '../forms';

export const RUNS = { numRuns: 150 };

/** The rules that found something, each with the gravest grade it gave: nought is a stop. */
export function gravest(findings: readonly Pick<Finding, 'rule' | 'grade'>[]): Map<RuleId, number> {
	const found = new Map<RuleId, number>();
	for (const { rule, grade } of findings) {
		found.set(rule, Math.min(found.get(rule) ?? Infinity, FINDING_GRADES.indexOf(grade)));
	}
	return found;
}

/** Fails where one of these rules found less now than then. */
export function expectNoneEased(then: Verdict, now: Verdict, rules: Iterable<RuleId>): void {
	const [was, is] = [gravest(then.findings), gravest(now.findings)];
	for (const rule of rules) {
		expect(is.get(rule) ?? Infinity, rule).toBeLessThanOrEqual(was.get(rule) ?? Infinity);
	}
}

/** Everything a finding says except its words, as lines in a fixed order. */
export function keysOf({ findings }: Verdict): string[] {
	return findings.map(({ rule, grade, reading, measured }) => [rule, grade, reading, measured].join()).sort();
}

export type Value = Extract<keyof Reading, 'hr' | 'sbp' | 'dbp' | 'spo2' | 'rr' | 'rpe' | 'pain'>;
/** A value, a step that is worse, the end of what can be typed, and the rules for which it is worse. */
export type Worse = [value: Value, step: number, bound: number, rules: RuleId[]];

/** Of a reading in effort or after it, compared with a base and judged by itself. */
export const WORSE: Worse[] = [
	['sbp', 5, 280, ['systolic-ceiling', 'systolic-rise']],
	['dbp', 5, 180, ['diastolic-ceiling']],
	['hr', 5, 250, ['heart-rate-ceiling', 'heart-rate-rise']],
	['rr', 3, 60, ['respiratory-ceiling']],
	['rpe', 1, 20, ['exertion-ceiling']],
	['pain', 1, 10, ['pain-ceiling']],
	['sbp', -5, 50, ['systolic-floor', 'systolic-fall', 'mean-floor']],
	['dbp', -5, 20, ['mean-floor']],
	['hr', -5, 20, ['heart-rate-floor']],
	['spo2', -2, 50, ['saturation-floor', 'saturation-fall']]
];

/** The value so many steps worse, never beyond what can be typed. */
export function worsened(value: number, [, step, bound]: Worse, times: number): number {
	const moved = value + step * times;
	return step > 0 ? Math.min(moved, bound) : Math.max(moved, bound);
}

/** The value of a reading so many steps worse; null where it was not measured. */
export function worseReading(reading: Reading, worse: Worse, times: number): Reading | null {
	const value = reading[worse[0]];
	return value == null ? null : { ...reading, [worse[0]]: worsened(value, worse, times) };
}
