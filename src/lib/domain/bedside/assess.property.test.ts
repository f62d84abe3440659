import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { assess } from './assess';
import { FINDING_GRADES, RULE_IDS } from './codes';
import type { Finding, Verdict } from './finding';
import { assessBody, type Assessment, type Reading } from './forms';
import { anySession } from './testing/arbitrary';

const RUNS = { numRuns: 150 };
const NEEDED = ['hr', 'sbp', 'dbp'] as const;

/** The rules that found something, each with the gravest grade it gave. */
function gravest({ findings }: Verdict): Map<Finding['rule'], number> {
	const found = new Map<Finding['rule'], number>();
	for (const { rule, grade } of findings) {
		found.set(rule, Math.min(found.get(rule) ?? Infinity, FINDING_GRADES.indexOf(grade)));
	}
	return found;
}

function withAfter(input: Assessment, change: Reading): Assessment {
	return { ...input, after: { ...input.after, ...change } };
}

describe('for any session', () => {
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

	it('a missing reading that is needed never makes the outcome clear', () => {
		fc.assert(
			fc.property(
				anySession,
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

	it('a value taken away is never taken as normal: the rule that stopped becomes unjudged', () => {
		const rules = [
			['spo2', 'saturation-floor'],
			['rr', 'respiratory-ceiling'],
			['pain', 'pain-ceiling']
		] as const;
		fc.assert(
			fc.property(anySession, fc.constantFrom(...rules), (input, [field, rule]) => {
				expect(assess(withAfter(input, { [field]: null })).notJudged).toContain(rule);
			}),
			RUNS
		);
	});

	it('null and left out are the same', () => {
		fc.assert(
			fc.property(
				anySession,
				fc.constantFrom('hr', 'sbp', 'spo2', 'posture', 'bpSource', 'rhythm', 'work'),
				(input, field) => {
					const one = assess(withAfter(input, { [field]: null }));
					expect(assess(withAfter(input, { [field]: undefined }))).toEqual(one);
				}
			),
			RUNS
		);
	});

	it('the outcome is that of its gravest finding, or incomplete', () => {
		fc.assert(
			fc.property(anySession, (input) => {
				const { findings, outcome } = assess(input);
				const has = (grade: Finding['grade']) => findings.some((finding) => finding.grade === grade);
				const missing = findings.some(({ rule }) => rule === 'reading-missing');
				const expected = has('stop') ? 'stop' : missing ? 'incomplete' : has('caution') ? 'caution' : 'clear';
				expect(outcome).toBe(expected);
			}),
			RUNS
		);
	});
});

describe('a finding never disappears and never eases', () => {
	/** The value after effort, moved in the direction that is worse for these rules alone. */
	const WORSE: [keyof Reading, number, number, Finding['rule'][]][] = [
		['sbp', 5, 280, ['systolic-ceiling', 'systolic-rise']],
		['dbp', 5, 180, ['diastolic-ceiling']],
		['hr', 5, 250, ['heart-rate-ceiling', 'heart-rate-rise']],
		['rr', 3, 60, ['respiratory-ceiling']],
		['rpe', 1, 20, ['exertion-ceiling']],
		['pain', 1, 10, ['pain-ceiling']],
		['sbp', -5, 50, ['systolic-floor', 'systolic-fall', 'mean-floor', 'postural-fall']],
		['dbp', -5, 20, ['mean-floor', 'postural-fall']],
		['hr', -5, 20, ['heart-rate-floor']],
		['spo2', -2, 50, ['saturation-floor', 'saturation-fall']]
	];

	it.each(WORSE)('when %s moves by %d', (field, step, bound, rules) => {
		fc.assert(
			fc.property(anySession, fc.integer({ min: 1, max: 6 }), (input, times) => {
				const value = input.after[field];
				fc.pre(typeof value === 'number');
				const moved = Number(value) + step * times;
				const worse = withAfter(input, {
					[field]: step > 0 ? Math.min(moved, bound) : Math.max(moved, bound)
				});
				const [then, now] = [gravest(assess(input)), gravest(assess(worse))];
				for (const rule of rules) {
					expect(now.get(rule) ?? Infinity).toBeLessThanOrEqual(then.get(rule) ?? Infinity);
				}
			}),
			RUNS
		);
	});

	/** Before a start there is nothing to compare with, so that only what judges each reading by itself is left. */
	const WORSE_BEFORE: typeof WORSE = [
		['sbp', 5, 280, ['systolic-ceiling']],
		['dbp', 5, 180, ['diastolic-ceiling']],
		['hr', 5, 250, ['heart-rate-ceiling']],
		['rr', 3, 60, ['respiratory-ceiling']],
		['pain', 1, 10, ['pain-ceiling']],
		['sbp', -5, 50, ['systolic-floor', 'mean-floor']],
		['hr', -5, 20, ['heart-rate-floor']],
		['spo2', -2, 50, ['saturation-floor']]
	];

	it.each(WORSE_BEFORE)('when %s before a start moves by %d', (field, step, bound, rules) => {
		fc.assert(
			fc.property(anySession, fc.integer({ min: 1, max: 6 }), (input, times) => {
				const value = input.before[field];
				fc.pre(typeof value === 'number');
				const moved = Number(value) + step * times;
				const to = step > 0 ? Math.min(moved, bound) : Math.max(moved, bound);
				const gravestBefore = (session: Assessment) =>
					gravest({
						...assess(session),
						findings: assess(session).findings.filter(({ reading }) => reading === 'before')
					});
				const then = gravestBefore(input);
				const now = gravestBefore({ ...input, before: { ...input.before, [field]: to } });
				for (const rule of rules) {
					expect(now.get(rule) ?? Infinity).toBeLessThanOrEqual(then.get(rule) ?? Infinity);
				}
			}),
			RUNS
		);
	});

	it('when a worse reading in effort is added', () => {
		fc.assert(
			fc.property(anySession, (input) => {
				const last = input.during.at(-1) ?? {};
				const worse = { ...last, sbp: 210, dbp: 116, hr: 140, spo2: 84, rr: 40, rpe: 18, pain: 9 };
				const then = gravest(assess(input));
				const now = gravest(assess({ ...input, during: [...input.during, worse] }));
				for (const rule of [
					'systolic-ceiling',
					'heart-rate-ceiling',
					'saturation-floor',
					'pain-ceiling'
				] as const) {
					expect(now.get(rule) ?? Infinity).toBeLessThanOrEqual(then.get(rule) ?? Infinity);
				}
			}),
			RUNS
		);
	});

	it('when a symptom is added', () => {
		fc.assert(
			fc.property(anySession, (input) => {
				const worse = assess({ ...input, symptoms: [...input.symptoms, 'angina'] });
				const [then, now] = [gravest(assess(input)), gravest(worse)];
				expect(worse.outcome).toBe('stop');
				for (const [rule, grade] of then) {
					expect(now.get(rule) ?? Infinity).toBeLessThanOrEqual(grade);
				}
			}),
			RUNS
		);
	});

	it('when every clearance is withdrawn', () => {
		fc.assert(
			fc.property(anySession, (input) => {
				const clearances = (input.context.clearances ?? []).map((clearance) =>
					typeof clearance === 'string'
						? { kind: clearance, state: 'withdrawn' as const }
						: { ...clearance, state: 'withdrawn' as const }
				);
				const then = gravest(assess(input));
				const now = gravest(assess({ ...input, context: { ...input.context, clearances } }));
				expect(now.get('clearance-missing') ?? Infinity).toBeLessThanOrEqual(
					then.get('clearance-missing') ?? Infinity
				);
			}),
			RUNS
		);
	});
});

describe('what must not matter', () => {
	/** Everything a finding says except its words, as lines in a fixed order. */
	const keys = ({ findings }: Verdict) =>
		findings.map(({ rule, grade, reading, measured }) => [rule, grade, reading, measured].join()).sort();
	/** Rules that look at one reading at a time: the order of the readings in effort is nothing to them. */
	const ABSOLUTE: Finding['rule'][] = [
		'systolic-ceiling',
		'systolic-floor',
		'mean-floor',
		'diastolic-ceiling',
		'heart-rate-ceiling',
		'heart-rate-floor',
		'respiratory-ceiling',
		'saturation-floor',
		'exertion-ceiling',
		'pain-ceiling'
	];

	it('the order of readings in effort, for the rules that judge each by itself', () => {
		fc.assert(
			fc.property(anySession, (input) => {
				const of = (session: Assessment) =>
					keys(assess(session)).filter((line) => ABSOLUTE.some((rule) => line.startsWith(`${rule},`)));
				expect(of({ ...input, during: [...input.during].reverse() })).toEqual(of(input));
			}),
			RUNS
		);
	});

	it('a unit of work: watts, stages or metres per minute judge alike as long as they grow alike', () => {
		fc.assert(
			fc.property(anySession, fc.constantFrom(0.5, 6, 26.8), (input, factor) => {
				const scaled = input.during.map((reading) =>
					reading.work == null ? reading : { ...reading, work: reading.work * factor + 1 }
				);
				expect(keys(assess({ ...input, during: scaled }))).toEqual(keys(assess(input)));
			}),
			RUNS
		);
	});

	it('a reading in effort that was taken twice', () => {
		fc.assert(
			fc.property(anySession, (input) => {
				const [first, ...rest] = input.during;
				fc.pre(first !== undefined);
				const twice = first === undefined ? input.during : [first, first, ...rest];
				expect(keys(assess({ ...input, during: twice }))).toEqual(keys(assess(input)));
			}),
			RUNS
		);
	});

	it('a finding of a reading is found whether it stands in effort or after it', () => {
		fc.assert(
			fc.property(anySession, (input) => {
				const moved = assess({ ...input, during: [...input.during, input.after] });
				const gravestMoved = gravest(moved);
				for (const [rule, grade] of gravest(assess(input))) {
					if (ABSOLUTE.includes(rule)) {
						expect(gravestMoved.get(rule) ?? Infinity).toBeLessThanOrEqual(grade);
					}
				}
			}),
			RUNS
		);
	});
});

it('a limit made narrower takes no finding away', () => {
	const narrower = {
		'systolic-ceiling': 150,
		'systolic-fall': 5,
		'pain-ceiling': 3,
		'heart-rate-ceiling': 100
	};
	fc.assert(
		fc.property(anySession, (input) => {
			fc.pre(input.context.limits == null && input.context.prescribed == null);
			const then = gravest(assess(input));
			const now = gravest(assess({ ...input, context: { ...input.context, limits: narrower } }));
			for (const [rule, grade] of then) {
				expect(now.get(rule) ?? Infinity).toBeLessThanOrEqual(grade);
			}
		}),
		RUNS
	);
});

it('the order of symptoms and activities does not matter', () => {
	const keys = ({ findings }: Verdict) =>
		findings.map(({ rule, grade, reading, measured }) => [rule, grade, reading, measured].join()).sort();
	fc.assert(
		fc.property(anySession, (input) => {
			const turned = {
				...input,
				symptoms: [...input.symptoms].reverse(),
				activities: [...input.activities].reverse()
			};
			expect(keys(assess(turned))).toEqual(keys(assess(input)));
		}),
		RUNS
	);
});
