/** What is known of the patient: checks before the start, drug, rhythm, phase, clearances, limits. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { RHYTHMS } from '../../core/codes';
import { assess } from '../assess';
import { PHASES, SETS } from '../codes';
import type { Assessment, Context } from '../forms';
import { anySession, calmSession } from '../testing/arbitrary';
import { expectNoneEased, keysOf, RUNS } from '../testing/worse';

const CHECKS = ['vasopressorRising', 'balloonPump', 'pacingDependent', 'bleeding'] as const;
const session = fc.oneof(anySession, calmSession);

const knowing = (input: Assessment, context: Partial<Context>): Assessment => ({
	...input,
	context: { ...input.context, ...context }
});

describe('a check before the start', () => {
	it('that holds bars the start, and eases nothing else', () => {
		fc.assert(
			fc.property(session, fc.constantFrom(...CHECKS), (input, check) => {
				const [then, now] = [assess(input), assess(knowing(input, { [check]: true }))];
				expect(now.findings).toContainEqual(
					expect.objectContaining({ rule: 'start-check', grade: 'stop', reading: 'before', measured: check })
				);
				expect(now.outcome).toBe('stop');
				expectNoneEased(
					then,
					now,
					then.findings.map(({ rule }) => rule)
				);
			}),
			RUNS
		);
	});

	it('that nobody answered is not judged, and is not taken as absent', () => {
		fc.assert(
			fc.property(
				session,
				fc.constantFrom(...CHECKS),
				fc.constantFrom(null, undefined),
				(input, check, open) => {
					expect(assess(knowing(input, { [check]: open })).notJudged).toContain('start-check');
				}
			),
			RUNS
		);
	});
});

describe('a rate-slowing drug', () => {
	it('that is not known is judged as taken, with a note', () => {
		fc.assert(
			fc.property(session, (input) => {
				const [taken, unknown] = [true, null].map((betaBlocked) => assess(knowing(input, { betaBlocked })));
				const without = keysOf(unknown ?? assess(input)).filter(
					(key) => !key.startsWith('beta-blocker-unknown')
				);
				expect(without).toEqual(keysOf(taken ?? assess(input)));
				expect(unknown?.findings.some(({ rule }) => rule === 'beta-blocker-unknown')).toBe(true);
			}),
			RUNS
		);
	});

	it('that is taken eases nothing', () => {
		fc.assert(
			fc.property(session, (input) => {
				const then = assess(knowing(input, { betaBlocked: false }));
				const now = assess(knowing(input, { betaBlocked: true }));
				expectNoneEased(
					then,
					now,
					then.findings.map(({ rule }) => rule)
				);
			}),
			RUNS
		);
	});
});

describe('a rhythm', () => {
	it('that is irregular eases the rise of the heart rate to a caution, and nothing else', () => {
		fc.assert(
			fc.property(session, fc.constantFrom(...RHYTHMS), (input, rhythm) => {
				const steady = (reading: Assessment['after']) => ({ ...reading, rhythm: null });
				const still: Assessment = {
					...input,
					before: steady(input.before),
					during: input.during.map(steady),
					after: steady(input.after)
				};
				const then = assess(knowing(still, { rhythm: 'sinus' }));
				const now = assess(knowing(still, { rhythm }));
				expectNoneEased(
					then,
					now,
					then.findings.map(({ rule }) => rule).filter((rule) => rule !== 'heart-rate-rise')
				);
				const rises = (verdict: typeof then) =>
					verdict.findings.filter(({ rule }) => rule === 'heart-rate-rise').map(({ reading }) => reading);
				expect(new Set(rises(now))).toEqual(new Set(rises(then)));
				expect(now.findings.some(({ rule }) => rule === 'rhythm-caveat')).toBe(rhythm !== 'sinus');
			}),
			RUNS
		);
	});
});

describe('a phase', () => {
	it('chooses the set where none is stated, and else says nothing', () => {
		fc.assert(
			fc.property(
				session,
				fc.constantFrom(...PHASES),
				fc.option(fc.constantFrom(...SETS)),
				(input, phase, set) => {
					const verdict = assess(knowing(input, { phase, set }));
					expect(verdict.set).toBe(set ?? (phase === 'outpatient' ? 'outpatient' : 'strict'));
					expect(keysOf(verdict)).toEqual(keysOf(assess(knowing(input, { phase: null, set: verdict.set }))));
				}
			),
			RUNS
		);
	});
});

it('clearances that are all withdrawn take no finding away', () => {
	fc.assert(
		fc.property(anySession, (input) => {
			const clearances = (input.context.clearances ?? []).map((clearance) =>
				typeof clearance === 'string'
					? { kind: clearance, state: 'withdrawn' as const }
					: { ...clearance, state: 'withdrawn' as const }
			);
			expectNoneEased(assess(input), assess(knowing(input, { clearances })), ['clearance-missing']);
		}),
		RUNS
	);
});

it('a limit made narrower takes no finding away', () => {
	const limits = {
		'systolic-ceiling': 150,
		'systolic-fall': 5,
		'pain-ceiling': 3,
		'heart-rate-ceiling': 100
	};
	fc.assert(
		fc.property(anySession, (input) => {
			fc.pre(input.context.limits == null && input.context.prescribed == null);
			const then = assess(input);
			expectNoneEased(
				then,
				assess(knowing(input, { limits })),
				then.findings.map(({ rule }) => rule)
			);
		}),
		RUNS
	);
});
