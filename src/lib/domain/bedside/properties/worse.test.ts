/** A finding never disappears and never eases when something gets worse, whatever the session is otherwise. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { assess } from '../assess';
import type { RuleId } from '../codes';
import type { Assessment } from '../forms';
import { anySession } from '../testing/arbitrary';
import { expectNoneEased, RUNS, WORSE, worseReading, type Worse } from '../testing/worse';

const steps = fc.integer({ min: 1, max: 6 });
const place = fc.nat({ max: 3 });

describe('a reading after effort', () => {
	/** A first reading on the feet, too, if that is where it was taken. */
	const AFTER = WORSE.map(([value, step, bound, rules]): Worse => {
		const postural: RuleId[] = (value === 'sbp' || value === 'dbp') && step < 0 ? ['postural-fall'] : [];
		return [value, step, bound, [...rules, ...postural]];
	});

	it.each(AFTER)('%s by %d', (...worse) => {
		fc.assert(
			fc.property(anySession, steps, (input, times) => {
				const after = worseReading(input.after, worse, times);
				fc.pre(after !== null);
				expectNoneEased(assess(input), assess({ ...input, after: after ?? {} }), worse[3]);
			}),
			RUNS
		);
	});
});

describe('a reading in effort', () => {
	it.each(WORSE)('%s by %d', (...worse) => {
		fc.assert(
			fc.property(anySession, steps, place, (input, times, at) => {
				const reading = input.during[at] ?? {};
				const moved = worseReading(reading, worse, times);
				// A reading at rest in a new posture is a base: the change rules then count from it.
				fc.pre(moved !== null && reading.settled !== true);
				const during = input.during.map((each, index) => (index === at && moved ? moved : each));
				expectNoneEased(assess(input), assess({ ...input, during }), worse[3]);
			}),
			RUNS
		);
	});

	it('added, and bad in every way', () => {
		const rules: RuleId[] = ['systolic-ceiling', 'heart-rate-ceiling', 'saturation-floor', 'pain-ceiling'];
		fc.assert(
			fc.property(anySession, (input) => {
				const last = input.during.at(-1) ?? {};
				const worse = { ...last, sbp: 210, dbp: 116, hr: 140, spo2: 84, rr: 40, rpe: 18, pain: 9 };
				expectNoneEased(assess(input), assess({ ...input, during: [...input.during, worse] }), rules);
			}),
			RUNS
		);
	});
});

describe('rising work', () => {
	const STAGES = [
		['sbp', 50, ['systolic-stage-fall', 'systolic-fall', 'systolic-floor', 'postural-fall']],
		['hr', 20, ['heart-rate-fall', 'heart-rate-floor']]
	] satisfies [string, number, RuleId[]][];
	const values = STAGES.map(([value, bound, rules]) => ({ value, bound, rules }));

	it.each(values)('$value lower from some reading in effort on', ({ value, bound, rules }) => {
		fc.assert(
			fc.property(anySession, fc.integer({ min: 1, max: 20 }), place, (input, by, from) => {
				const readings = [...input.during.slice(from), input.after].map(
					(each) => each[value as 'sbp' | 'hr']
				);
				fc.pre(readings.every((each) => each == null || each - by >= bound));
				expectNoneEased(assess(input), assess(lowerFrom(input, value as 'sbp' | 'hr', from, by)), rules);
			}),
			RUNS
		);
	});

	it.each(values)('more work at the last reading of $value in effort', ({ rules }) => {
		fc.assert(
			fc.property(anySession, fc.integer({ min: 1, max: 5 }), (input, more) => {
				const last = input.during.at(-1);
				fc.pre(last?.work != null);
				const worked = { ...last, work: (last?.work ?? 0) + more };
				const now = assess({ ...input, during: [...input.during.slice(0, -1), worked] });
				expectNoneEased(assess(input), now, rules);
			}),
			RUNS
		);
	});

	/** From one reading in effort on everything is lower: no fall that was there can have become less. */
	function lowerFrom(input: Assessment, value: 'sbp' | 'hr', from: number, by: number): Assessment {
		const lower = <T extends Assessment['after']>(reading: T): T => {
			const was = reading[value];
			return was == null ? reading : { ...reading, [value]: was - by };
		};
		const during = input.during.map((reading, index) => (index >= from ? lower(reading) : reading));
		return { ...input, during, after: lower(input.after) };
	}
});

describe('a reading before the start', () => {
	/** There is nothing to compare it with: only what judges each reading by itself is left. */
	const ALONE: RuleId[] = ['systolic-rise', 'heart-rate-rise', 'systolic-fall', 'saturation-fall'];
	const BEFORE = WORSE.filter(([value]) => value !== 'rpe').map(([value, step, bound, rules]): Worse => [
		value,
		step,
		bound,
		rules.filter((rule) => !ALONE.includes(rule))
	]);

	it.each(BEFORE)('%s by %d', (...worse) => {
		const ofBefore = (input: Assessment) => {
			const verdict = assess(input);
			return { ...verdict, findings: verdict.findings.filter(({ reading }) => reading === 'before') };
		};
		fc.assert(
			fc.property(anySession, steps, (input, times) => {
				const before = worseReading(input.before, worse, times);
				fc.pre(before !== null);
				expectNoneEased(ofBefore(input), ofBefore({ ...input, before: before ?? {} }), worse[3]);
			}),
			RUNS
		);
	});
});

it('a symptom that is added eases nothing, and this one stops', () => {
	fc.assert(
		fc.property(anySession, (input) => {
			const [then, now] = [assess(input), assess({ ...input, symptoms: [...input.symptoms, 'angina'] })];
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
