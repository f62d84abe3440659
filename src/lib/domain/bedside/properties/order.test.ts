/** What must not matter: the order of what has no order, the unit of work, a reading written down twice. */
import fc from 'fast-check';
import { expect, it } from 'vitest';
import { assess } from '../assess';
import type { Assessment } from '../forms';
import { absoluteRules } from '../rules/absolute';
import { anySession } from '../testing/arbitrary';
import { gravest, keysOf, RUNS } from '../testing/worse';

/** Rules that look at one reading at a time: the order of the readings in effort is nothing to them. */
const ABSOLUTE = absoluteRules.map(({ id }) => id);

it('the order of readings in effort, for the rules that judge each by itself', () => {
	fc.assert(
		fc.property(anySession, (input) => {
			const of = (session: Assessment) =>
				keysOf(assess(session)).filter((line) => ABSOLUTE.some((rule) => line.startsWith(`${rule},`)));
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
			expect(keysOf(assess({ ...input, during: scaled }))).toEqual(keysOf(assess(input)));
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
			expect(keysOf(assess({ ...input, during: twice }))).toEqual(keysOf(assess(input)));
		}),
		RUNS
	);
});

it('whether a reading stands in effort or after it', () => {
	fc.assert(
		fc.property(anySession, (input) => {
			const moved = gravest(assess({ ...input, during: [...input.during, input.after] }).findings);
			for (const [rule, grade] of gravest(assess(input).findings)) {
				if (ABSOLUTE.includes(rule)) {
					expect(moved.get(rule) ?? Infinity).toBeLessThanOrEqual(grade);
				}
			}
		}),
		RUNS
	);
});

it('the order of symptoms and activities', () => {
	fc.assert(
		fc.property(anySession, (input) => {
			const turned = {
				...input,
				symptoms: [...input.symptoms].reverse(),
				activities: [...input.activities].reverse()
			};
			expect(keysOf(assess(turned))).toEqual(keysOf(assess(input)));
		}),
		RUNS
	);
});
