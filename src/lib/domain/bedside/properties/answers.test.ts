/** For any session: the rules answer, what is missing is never normal, and the outcome is that of the findings. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { assess } from '../assess';
import { RULE_IDS } from '../codes';
import type { Finding } from '../finding';
import { assessBody, type Assessment, type Reading } from '../forms';
import { anySession, calmSession } from '../testing/arbitrary';
import { RUNS } from '../testing/worse';

const NEEDED = ['hr', 'sbp', 'dbp'] as const;
const session = fc.oneof(anySession, calmSession);

function withAfter(input: Assessment, change: Reading): Assessment {
	return { ...input, after: { ...input.after, ...change } };
}

it('the schema accepts it, and the rules answer without throwing', () => {
	fc.assert(
		fc.property(anySession, (input) => {
			const { findings, notJudged } = assess(assessBody.parse(input));
			expect(notJudged.every((rule) => RULE_IDS.includes(rule))).toBe(true);
			expect(new Set(notJudged).size).toBe(notJudged.length);
			for (const { rule, reason, source } of findings) {
				expect(RULE_IDS).toContain(rule);
				expect(reason).toMatch(/^[A-Z].*\.$/);
				expect(reason).not.toMatch(/NaN|undefined|null|Infinity/);
				expect(source).not.toBe('');
			}
		}),
		RUNS
	);
});

it('the outcome is that of its gravest finding, or incomplete', () => {
	fc.assert(
		fc.property(session, (input) => {
			const { findings, outcome } = assess(input);
			const has = (grade: Finding['grade']) => findings.some((finding) => finding.grade === grade);
			const missing = findings.some(({ rule }) => rule === 'reading-missing');
			const expected = has('stop') ? 'stop' : missing ? 'incomplete' : has('caution') ? 'caution' : 'clear';
			expect(outcome).toBe(expected);
		}),
		RUNS
	);
});

describe('what is missing', () => {
	it('of what is needed never makes the outcome clear', () => {
		fc.assert(
			fc.property(
				session,
				fc.constantFrom('before' as const, 'after' as const),
				fc.constantFrom(...NEEDED),
				(input, moment, field) => {
					const without = { ...input, [moment]: { ...input[moment], [field]: null } };
					expect(['stop', 'incomplete']).toContain(assess(without).outcome);
				}
			),
			RUNS
		);
	});

	it('is never taken as normal: the rule that judged it becomes unjudged', () => {
		const rules = [
			['spo2', 'saturation-floor'],
			['rr', 'respiratory-ceiling'],
			['pain', 'pain-ceiling']
		] as const;
		fc.assert(
			fc.property(session, fc.constantFrom(...rules), (input, [field, rule]) => {
				expect(assess(withAfter(input, { [field]: null })).notJudged).toContain(rule);
			}),
			RUNS
		);
	});

	it('is the same left out and null', () => {
		fc.assert(
			fc.property(
				session,
				fc.constantFrom('hr', 'sbp', 'spo2', 'posture', 'bpSource', 'rhythm', 'work'),
				(input, field) => {
					const one = assess(withAfter(input, { [field]: null }));
					expect(assess(withAfter(input, { [field]: undefined }))).toEqual(one);
				}
			),
			RUNS
		);
	});
});
