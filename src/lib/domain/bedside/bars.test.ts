import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { assess } from './assess';
import { barsOf } from './bars';
import { FINDING_GRADES, type Moment, type RuleId } from './codes';
import type { Drawn } from './drawn';
import type { Assessment } from './forms';
import { limitsFor } from './limits/limits';
import { isBeyond } from './rules/bar';
import { anySession } from './testing/arbitrary';
import type { REST } from './testing/sample';
import { session } from './testing/sample';

/** The rules whose limits are drawn, and the value each looks at. */
const RULES: Partial<Record<RuleId, Drawn>> = {
	'systolic-ceiling': 'sbp',
	'systolic-floor': 'sbp',
	'systolic-fall': 'sbp',
	'systolic-rise': 'sbp',
	'diastolic-ceiling': 'dbp',
	'heart-rate-ceiling': 'hr',
	'heart-rate-floor': 'hr',
	'heart-rate-rise': 'hr',
	'saturation-floor': 'spo2',
	'saturation-fall': 'spo2',
	'exertion-ceiling': 'rpe'
};

const words = (input: Assessment, measure: Drawn, reading: number) =>
	barsOf(input)
		.filter((bar) => bar.measure === measure && bar.reading === reading)
		.map(({ grade, up, including, value }) => `${grade} ${up ? '>' : '<'}${including ? '=' : ''} ${value}`);

describe('barsOf', () => {
	it.each<[Drawn, Partial<typeof REST>, Partial<typeof REST>, string[]]>([
		// Base 70 on a rate-slowing drug: a rise over 12 stops, from 9.6 it cautions (80 %, common practice, no
		// published source); under 40 stops and under 50 cautions.
		['hr', { hr: 70 }, { hr: 80 }, ['stop > 82', 'caution >= 79.6', 'stop < 40', 'caution < 50']],
		// A base of 125 puts the rise over the ceiling of 130, from the caution over 120 on.
		['hr', { hr: 125 }, { hr: 126 }, ['stop > 130', 'caution > 120', 'stop < 40', 'caution < 50']],
		// Base 128: a fall over 10 stops, from 8 it cautions; a rise over 30 stops, from 24 it cautions.
		['sbp', { sbp: 128 }, { sbp: 128 }, ['stop > 158', 'caution >= 152', 'stop < 118', 'caution <= 120']],
		// Base 95: the floor of 90 is nearer than the fall to 85; its caution of the fall, at 87, is never met.
		['sbp', { sbp: 95 }, { sbp: 95 }, ['stop > 125', 'caution >= 119', 'stop < 90']],
		['dbp', { dbp: 70 }, { dbp: 70 }, ['stop >= 110', 'caution >= 100']],
		// A fall of 4 cautions: base 97, so at 93 and under.
		['spo2', { spo2: 97 }, { spo2: 97 }, ['stop < 88', 'caution <= 93']]
	])('%s after %j', (measure, before, after, bars) => {
		const input = session({ before, after, context: { betaBlocked: true } });
		expect(words(input, measure, input.during.length + 1)).toEqual(bars);
	});

	it('judges exertion in effort and after it, not before', () => {
		const input = session({ before: { rpe: 6 }, after: { rpe: 11 } });
		expect(words(input, 'rpe', 0)).toEqual([]);
		expect(words(input, 'rpe', input.during.length + 1)).toEqual(['stop > 15', 'caution > 13']);
	});

	it('follows the limits of the unit and of the patient', () => {
		const input = session({
			before: { sbp: 128 },
			after: { sbp: 128 },
			context: { limits: { 'systolic-rise': 20 } }
		});
		const bars = barsOf(input, limitsFor('strict', { 'systolic-fall': 20 }));
		const after = bars.filter(({ measure, reading }) => measure === 'sbp' && reading > input.during.length);
		expect(after.filter(({ grade }) => grade === 'stop').map(({ value }) => value)).toEqual([148, 108]);
	});

	it('agrees with the findings for any session: the gravest bar crossed is the gravest grade found', () => {
		fc.assert(
			fc.property(anySession, (input) => {
				expect(crossed(input)).toEqual(found(input));
			}),
			{ numRuns: 300 }
		);
	});
});

const MEASURES = [...new Set(Object.values(RULES))];
type Graded = Record<string, number>;

/** The gravest grade of each value at each moment, as the bars have it. */
function crossed(input: Assessment): Graded {
	const readings = [input.before, ...input.during, input.after];
	const grades: Graded = {};
	for (const bar of barsOf(input)) {
		const value = readings[bar.reading]?.[bar.measure];
		if (value != null && isBeyond(bar, value)) {
			note(grades, bar.measure, momentOf(bar.reading, readings.length), bar.grade);
		}
	}
	return grades;
}

function found(input: Assessment): Graded {
	const grades: Graded = {};
	for (const { rule, reading, grade } of assess(input).findings) {
		const measure = RULES[rule];
		if (measure && MEASURES.includes(measure)) {
			note(grades, measure, reading, grade);
		}
	}
	return grades;
}

function note(grades: Graded, measure: Drawn, moment: Moment, grade: (typeof FINDING_GRADES)[number]): void {
	const key = `${measure} ${moment}`;
	grades[key] = Math.min(grades[key] ?? Infinity, FINDING_GRADES.indexOf(grade));
}

function momentOf(reading: number, count: number): Moment {
	return reading === 0 ? 'before' : reading === count - 1 ? 'after' : 'during';
}
