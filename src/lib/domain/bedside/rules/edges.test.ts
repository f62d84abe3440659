/**
 * Every limit of every set on its three sides: a tenth under it, exactly at it, a tenth over it. The numbers are those
 * of the table of response rules in the description of the JSON API, written out here and not taken from the code's own
 * tables. Published: the floors of pressure, pulse and saturation and 38.5 °C (early mobilisation in intensive care), what
 * holds at rest (contraindications), the outpatient ceilings and falls and the fall under rising work (reasons to end a
 * stress test), the fall of saturation (exercise oximetry). Secondary, from study notes: the inpatient ceilings in effort
 * and the changes of the set `guideline`. From memory: the changes of the set `strict`, 50 beats, 90 %, 90 degrees.
 * Common practice, no published source: breathing, pain, exertion over 15, 45 degrees, the fall of the pulse, and the
 * cautions at 80 % of a limit and at 180, 220 and 100 mmHg. The table in docs/CLINICAL.md names it limit by limit.
 */
import { describe, expect, it } from 'vitest';
import { SETS, type RuleId, type SetName } from '../codes';
import type { Context, Reading } from '../forms';
import { grades, judge, REST, readingWith, type Changes, type ReadingField } from '../testing/sample';

type Grade = 'stop' | 'caution' | null;
type Moment = 'before' | 'during' | 'after';
type Sides = [under: Grade, at: Grade, over: Grade];
/** What a session is in which that value is met. */
type Meet = (value: number) => Changes;
type Edge = [sets: readonly SetName[], rule: RuleId, limit: number, moment: Moment, meet: Meet, sides: Sides];

const INPATIENT: readonly SetName[] = ['strict', 'guideline'];
const OUT: readonly SetName[] = ['outpatient'];
const STRICT: readonly SetName[] = ['strict'];
const NOT_STRICT: readonly SetName[] = ['guideline', 'outpatient'];

const NOTHING: Sides = [null, null, null];
const OVER_CAUTION: Sides = [null, null, 'caution'];
const OVER_CAUTION_TO_STOP: Sides = ['caution', 'caution', 'stop'];
const OVER_STOP: Sides = [null, null, 'stop'];
const AT_CAUTION: Sides = [null, 'caution', 'caution'];
const AT_STOP: Sides = ['caution', 'stop', 'stop'];
const UNDER_STOP: Sides = ['stop', null, null];
const UNDER_STOP_ELSE_CAUTION: Sides = ['stop', 'caution', 'caution'];
const UNDER_CAUTION: Sides = ['caution', null, null];

const before =
	(field: ReadingField): Meet =>
	(value) => ({ before: readingWith(field, value) });
const during =
	(field: ReadingField): Meet =>
	(value) => ({ during: [readingWith(field, value)] });
const after =
	(field: ReadingField): Meet =>
	(value) => ({ after: readingWith(field, value) });

/** The same limits at rest before, in effort and after it. */
const always = (
	sets: readonly SetName[],
	rule: RuleId,
	field: ReadingField,
	limit: number,
	sides: Sides
): Edge[] => [
	[sets, rule, limit, 'before', before(field), sides],
	[sets, rule, limit, 'during', during(field), sides],
	[sets, rule, limit, 'after', after(field), sides]
];
const atRest = (rule: RuleId, field: ReadingField, limit: number, sides: Sides): Edge[] => [
	[SETS, rule, limit, 'before', before(field), sides]
];
const inEffort = (
	sets: readonly SetName[],
	rule: RuleId,
	field: ReadingField,
	limit: number,
	sides: Sides
): Edge[] => [
	[sets, rule, limit, 'during', during(field), sides],
	[sets, rule, limit, 'after', after(field), sides]
];

const from = (one: Reading, two: Reading, context: Changes['context'] = {}): Changes => ({
	context,
	before: { ...REST, ...one },
	during: [],
	after: { ...REST, ...two }
});
const systolicFall: Meet = (by) => from({ sbp: 125 }, { sbp: 125 - by });
const systolicRise: Meet = (by) => from({ sbp: 110 }, { sbp: 110 + by });
const pulseRise: Meet = (by) => from({ hr: 70 }, { hr: 70 + by });
const pulseRiseOnDrug: Meet = (by) => from({ hr: 70 }, { hr: 70 + by }, { betaBlocked: true });
const pulseRiseUnknown: Meet = (by) => from({ hr: 70 }, { hr: 70 + by }, { betaBlocked: null });
const saturationFall: Meet = (by) => from({ spo2: 99 }, { spo2: 99 - by });
const rising = (one: Reading, two: Reading): Changes => ({
	during: [
		{ ...REST, ...one, work: 1 },
		{ ...REST, ...two, work: 2 }
	]
});
const stageFall: Meet = (by) => rising({ sbp: 150 }, { sbp: 150 - by });
const pulseFall: Meet = (by) => rising({ hr: 100 }, { hr: 100 - by });
const lift =
	(clearances: Context['clearances']): Meet =>
	(elevationDeg) => ({ context: { clearances }, activities: [{ code: 'active-arms', elevationDeg }] });

/** Mean pressure = diastolic + (systolic - diastolic) / 3: 100/40 has one of 60. */
const mean = (dbp: number): Reading => ({ ...REST, sbp: 100, dbp });
const prescribed =
	(field: ReadingField, moment: 'during' | 'after'): Meet =>
	(value) => ({
		...(moment === 'during' ? during(field)(value) : after(field)(value)),
		context: { phase: 'outpatient', prescribed: { hrMin: 90, hrMax: 118, rpeMin: 11, rpeMax: 14 } }
	});
const inRange = (rule: RuleId, field: ReadingField, limit: number, sides: Sides): Edge[] => [
	[OUT, rule, limit, 'during', prescribed(field, 'during'), sides],
	[OUT, rule, limit, 'after', prescribed(field, 'after'), sides]
];

const EDGES: Edge[] = [
	...atRest('systolic-ceiling', 'sbp', 180, OVER_STOP),
	...inEffort(INPATIENT, 'systolic-ceiling', 'sbp', 180, OVER_CAUTION),
	...inEffort(INPATIENT, 'systolic-ceiling', 'sbp', 200, OVER_CAUTION_TO_STOP),
	...inEffort(OUT, 'systolic-ceiling', 'sbp', 220, OVER_CAUTION),
	...inEffort(OUT, 'systolic-ceiling', 'sbp', 250, OVER_CAUTION_TO_STOP),
	...always(SETS, 'systolic-floor', 'sbp', 90, UNDER_STOP),
	[SETS, 'mean-floor', 40, 'before', (dbp) => ({ before: mean(dbp) }), UNDER_STOP],
	[SETS, 'mean-floor', 40, 'during', (dbp) => ({ during: [mean(dbp)] }), UNDER_STOP],
	[SETS, 'mean-floor', 40, 'after', (dbp) => ({ after: mean(dbp) }), UNDER_STOP],
	...atRest('diastolic-ceiling', 'dbp', 100, AT_CAUTION),
	...atRest('diastolic-ceiling', 'dbp', 110, AT_STOP),
	...inEffort(SETS, 'diastolic-ceiling', 'dbp', 100, AT_CAUTION),
	...inEffort(INPATIENT, 'diastolic-ceiling', 'dbp', 110, AT_STOP),
	...inEffort(OUT, 'diastolic-ceiling', 'dbp', 115, OVER_CAUTION_TO_STOP),
	...atRest('heart-rate-ceiling', 'hr', 120, OVER_STOP),
	...inEffort(SETS, 'heart-rate-ceiling', 'hr', 120, OVER_CAUTION),
	...inEffort(SETS, 'heart-rate-ceiling', 'hr', 130, OVER_CAUTION_TO_STOP),
	...inRange('heart-rate-ceiling', 'hr', 118, OVER_STOP),
	...always(SETS, 'heart-rate-floor', 'hr', 40, UNDER_STOP_ELSE_CAUTION),
	...always(SETS, 'heart-rate-floor', 'hr', 50, UNDER_CAUTION),
	...atRest('respiratory-ceiling', 'rr', 24, OVER_CAUTION),
	...atRest('respiratory-ceiling', 'rr', 30, OVER_CAUTION_TO_STOP),
	...inEffort(SETS, 'respiratory-ceiling', 'rr', 30, OVER_CAUTION),
	...inEffort(SETS, 'respiratory-ceiling', 'rr', 35, OVER_CAUTION_TO_STOP),
	...always(SETS, 'saturation-floor', 'spo2', 88, UNDER_STOP_ELSE_CAUTION),
	...always(SETS, 'saturation-floor', 'spo2', 90, UNDER_CAUTION),
	...inEffort(SETS, 'exertion-ceiling', 'rpe', 13, OVER_CAUTION),
	...inEffort(SETS, 'exertion-ceiling', 'rpe', 15, OVER_CAUTION_TO_STOP),
	...inRange('exertion-ceiling', 'rpe', 14, OVER_CAUTION),
	...inRange('exertion-ceiling', 'rpe', 16, OVER_CAUTION_TO_STOP),
	...always(SETS, 'pain-ceiling', 'pain', 4, AT_CAUTION),
	...always(SETS, 'pain-ceiling', 'pain', 7, AT_STOP),
	[SETS, 'temperature-ceiling', 38, 'before', (temperature) => ({ context: { temperature } }), OVER_CAUTION],
	[
		SETS,
		'temperature-ceiling',
		38.5,
		'before',
		(temperature) => ({ context: { temperature } }),
		OVER_CAUTION_TO_STOP
	],
	[STRICT, 'systolic-fall', 8, 'after', systolicFall, AT_CAUTION],
	[STRICT, 'systolic-fall', 10, 'after', systolicFall, OVER_CAUTION_TO_STOP],
	[NOT_STRICT, 'systolic-fall', 10, 'after', systolicFall, OVER_STOP],
	[STRICT, 'systolic-rise', 24, 'after', systolicRise, AT_CAUTION],
	[STRICT, 'systolic-rise', 30, 'after', systolicRise, OVER_CAUTION_TO_STOP],
	[STRICT, 'heart-rate-rise', 16, 'after', pulseRise, AT_CAUTION],
	[STRICT, 'heart-rate-rise', 20, 'after', pulseRise, OVER_CAUTION_TO_STOP],
	[STRICT, 'heart-rate-rise', 9.6, 'after', pulseRiseOnDrug, AT_CAUTION],
	[STRICT, 'heart-rate-rise', 12, 'after', pulseRiseOnDrug, OVER_CAUTION_TO_STOP],
	[['guideline'], 'heart-rate-rise', 30, 'after', pulseRise, OVER_STOP],
	[['guideline'], 'heart-rate-rise', 30, 'after', pulseRiseOnDrug, OVER_STOP],
	// Not known counts as given.
	[STRICT, 'heart-rate-rise', 9.6, 'after', pulseRiseUnknown, AT_CAUTION],
	[STRICT, 'heart-rate-rise', 12, 'after', pulseRiseUnknown, OVER_CAUTION_TO_STOP],
	[['guideline'], 'heart-rate-rise', 30, 'after', pulseRiseUnknown, OVER_STOP],
	[OUT, 'heart-rate-rise', 30, 'after', pulseRise, NOTHING],
	[OUT, 'heart-rate-rise', 30, 'after', pulseRiseOnDrug, NOTHING],
	[OUT, 'heart-rate-rise', 30, 'after', pulseRiseUnknown, NOTHING],
	[SETS, 'saturation-fall', 4, 'after', saturationFall, AT_CAUTION],
	[STRICT, 'systolic-stage-fall', 8, 'during', stageFall, AT_CAUTION],
	[STRICT, 'systolic-stage-fall', 10, 'during', stageFall, OVER_CAUTION_TO_STOP],
	[NOT_STRICT, 'systolic-stage-fall', 10, 'during', stageFall, OVER_STOP],
	[STRICT, 'heart-rate-fall', 8, 'during', pulseFall, AT_CAUTION],
	[STRICT, 'heart-rate-fall', 10, 'during', pulseFall, OVER_CAUTION_TO_STOP],
	[NOT_STRICT, 'heart-rate-fall', 10, 'during', pulseFall, OVER_STOP],
	[SETS, 'arm-elevation', 45, 'during', lift([]), OVER_STOP],
	[SETS, 'arm-elevation', 90, 'during', lift(['arm-stage']), OVER_STOP],
	[SETS, 'arm-elevation', 70, 'during', lift([{ kind: 'arm-stage', maxElevationDeg: 70 }]), OVER_STOP]
];

describe.each(SETS)('each limit of the set %s', (set) => {
	const rows = EDGES.filter(([sets]) => sets.includes(set)).flatMap(([, rule, limit, moment, meet, sides]) =>
		[-0.1, 0, 0.1].map((aside, at) => {
			// Tenths are typed, not the noise that a sum of them carries.
			const value = Math.round((limit + aside) * 10) / 10;
			return [rule, value, moment, sides[at] ?? null, meet] as const;
		})
	);

	it.each(rows)('%s: %d %s: %s', (rule, value, moment, grade, meet) => {
		const changes = meet(value);
		const verdict = judge({ ...changes, context: { set, ...changes.context } });
		const found = grades(verdict, rule).filter((each) => each.endsWith(moment));
		expect(found).toEqual(grade === null ? [] : [`${grade} ${moment}`]);
	});
});

describe.each(SETS)('two postures, none of them settled, in the set %s', (set) => {
	it.each([
		['systolic-fall', { sbp: 130 }, { sbp: 112 }, true],
		['systolic-rise', { sbp: 110 }, { sbp: 150 }, set === 'strict'],
		['heart-rate-rise', { hr: 70 }, { hr: 105 }, set !== 'outpatient'],
		['saturation-fall', { spo2: 99 }, { spo2: 92 }, true]
	] as const)(
		'%s finds nothing, and is said not to have been judged where it holds',
		(rule, one, two, holds) => {
			const changes = from({ ...one, posture: 'sitting' }, { ...two, posture: 'standing' }, { set });
			const verdict = judge(changes);
			expect(grades(verdict, rule)).toEqual([]);
			expect(verdict.notJudged.includes(rule)).toBe(holds);
			// The same values in one posture are found, so that what is said above is of the posture.
			const same = judge(from(one, two, { set }));
			expect(grades(same, rule).length > 0).toBe(holds);
		}
	);
});
