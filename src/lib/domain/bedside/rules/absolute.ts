/**
 * Absolute rules judge every reading by itself, the one before the session included. A ceiling is crossed from
 * below, a floor from above; 'over' and 'under' are strict, 'at' includes the limit. Before the session a stop
 * means 'do not start'. In effort and after it the limits are wider, because the body is meant to answer to
 * work; where a set is silent about one of the two, that moment is not judged by the rule. The mean pressure is
 * the diastolic plus a third of the pulse pressure. Exertion is judged in effort and after, not at rest.
 */
import type { LimitKey, Moment, RuleId } from '../codes';
import type { RuleFinding } from '../finding';
import { crosses, type Limit } from '../limits/limits';
import { exact, plain } from '../numbers';
import { measured, type Measure, type Placed } from '../timeline';
import { barAt, type Bar } from './bar';
import { CROSSING_WORDS, limitOf, MOMENT_WORDS, overLimit, type Facts, type Rule } from './rule';

/** The limits that stop and caution at one kind of moment. */
interface Bars {
	readonly stop: LimitKey;
	readonly caution: LimitKey | null;
}

interface AbsoluteRule {
	readonly id: RuleId;
	readonly what: string;
	readonly words: string;
	/** The value of a reading that it judges; null where it is worked out of several. */
	readonly measure: Measure | null;
	readonly value: (placed: Placed) => number | null;
	/** Null where the rule does not judge the reading before the session. */
	readonly before: Bars | null;
	readonly effort: Bars;
}

/** Mean pressure in mmHg, or null when one of its two parts was not measured. */
export function meanPressure(placed: Placed): number | null {
	const [sbp, dbp] = [measured(placed, 'sbp'), measured(placed, 'dbp')];
	return sbp === null || dbp === null ? null : exact(dbp + (sbp - dbp) / 3);
}

const ABSOLUTE: readonly AbsoluteRule[] = [
	{
		id: 'systolic-ceiling',
		what: 'systolic pressure',
		words: 'The systolic pressure must not be too high: lower before a start than in effort and after it.',
		measure: 'sbp',
		value: (placed) => measured(placed, 'sbp'),
		before: { stop: 'systolic-ceiling.before', caution: null },
		effort: { stop: 'systolic-ceiling', caution: 'systolic-ceiling.caution' }
	},
	{
		id: 'systolic-floor',
		what: 'systolic pressure',
		words: 'The systolic pressure must not be too low, at any moment.',
		measure: 'sbp',
		value: (placed) => measured(placed, 'sbp'),
		before: { stop: 'systolic-floor', caution: null },
		effort: { stop: 'systolic-floor', caution: null }
	},
	{
		id: 'mean-floor',
		what: 'mean pressure',
		words:
			'The mean pressure, the diastolic plus a third of the pulse pressure, must not be too low at any moment.',
		measure: null,
		value: meanPressure,
		before: { stop: 'mean-floor', caution: null },
		effort: { stop: 'mean-floor', caution: null }
	},
	{
		id: 'diastolic-ceiling',
		what: 'diastolic pressure',
		words: 'The diastolic pressure must not be too high, at any moment.',
		measure: 'dbp',
		value: (placed) => measured(placed, 'dbp'),
		before: { stop: 'diastolic-ceiling.before', caution: 'diastolic-ceiling.caution' },
		effort: { stop: 'diastolic-ceiling', caution: 'diastolic-ceiling.caution' }
	},
	{
		id: 'heart-rate-ceiling',
		what: 'heart rate',
		words:
			'The heart rate must not be too high. An outpatient is stopped by the top of the prescribed range; without one the general ceiling holds.',
		measure: 'hr',
		value: (placed) => measured(placed, 'hr'),
		before: { stop: 'heart-rate-ceiling.before', caution: null },
		effort: { stop: 'heart-rate-ceiling', caution: 'heart-rate-ceiling.caution' }
	},
	{
		id: 'heart-rate-floor',
		what: 'heart rate',
		words: 'The heart rate must not be too low, at any moment.',
		measure: 'hr',
		value: (placed) => measured(placed, 'hr'),
		before: { stop: 'heart-rate-floor', caution: 'heart-rate-floor.caution' },
		effort: { stop: 'heart-rate-floor', caution: 'heart-rate-floor.caution' }
	},
	{
		id: 'respiratory-ceiling',
		what: 'breathing rate',
		words: 'The breathing rate must not be too high: lower before a start than in effort and after it.',
		measure: 'rr',
		value: (placed) => measured(placed, 'rr'),
		before: { stop: 'respiratory-ceiling.before', caution: 'respiratory-ceiling.before-caution' },
		effort: { stop: 'respiratory-ceiling', caution: 'respiratory-ceiling.caution' }
	},
	{
		id: 'saturation-floor',
		what: 'oxygen saturation',
		words: 'The oxygen saturation must not be too low, at any moment.',
		measure: 'spo2',
		value: (placed) => measured(placed, 'spo2'),
		before: { stop: 'saturation-floor', caution: 'saturation-floor.caution' },
		effort: { stop: 'saturation-floor', caution: 'saturation-floor.caution' }
	},
	{
		id: 'exertion-ceiling',
		what: 'exertion',
		words:
			'The effort a patient feels, on the Borg scale from 6 to 20, must not be too high. An outpatient is cautioned over the prescribed range and stopped more than two points over it.',
		measure: 'rpe',
		value: (placed) => measured(placed, 'rpe'),
		before: null,
		effort: { stop: 'exertion-ceiling', caution: 'exertion-ceiling.caution' }
	},
	{
		id: 'pain-ceiling',
		what: 'pain',
		words: 'Pain, from 0 to 10, must not be too strong at any moment.',
		measure: 'pain',
		value: (placed) => measured(placed, 'pain'),
		before: { stop: 'pain-ceiling', caution: 'pain-ceiling.caution' },
		effort: { stop: 'pain-ceiling', caution: 'pain-ceiling.caution' }
	}
];

/** The absolute rules on readings, as rows of the registry. */
export const absoluteRules: readonly Rule[] = ABSOLUTE.map((rule) => ({
	id: rule.id,
	words: rule.words,
	sources: [],
	judge: (facts) => [
		...worst(rule, facts, 'before', [facts.before]),
		...worst(rule, facts, 'during', facts.during),
		...worst(rule, facts, 'after', [facts.after])
	],
	lacks: (facts) => lacks(rule, facts)
}));

/** The limits that judged one value of one reading by itself. */
export function absoluteBars(facts: Facts, { moment }: Placed, measure: Measure): Bar[] {
	return ABSOLUTE.filter((rule) => rule.measure === measure).flatMap((rule) => {
		const bars = moment === 'before' ? rule.before : rule.effort;
		return (['stop', 'caution'] as const).flatMap((grade) => {
			const limit = bars?.[grade] ? limitOf(facts, bars[grade]) : null;
			return limit ? [barAt(grade, limit.value, limit.when !== 'under', limit.when === 'at')] : [];
		});
	});
}

/** The gravest crossing among readings of one moment: one finding at most, so that a long walk is one line. */
function worst(rule: AbsoluteRule, facts: Facts, moment: Moment, readings: readonly Placed[]): RuleFinding[] {
	const bars = moment === 'before' ? rule.before : rule.effort;
	const values = readings.map(rule.value).filter((value) => value !== null);
	if (bars === null || values.length === 0) {
		return [];
	}
	for (const grade of ['stop', 'caution'] as const) {
		const key = bars[grade];
		const limit = key && limitOf(facts, key);
		const extreme = limit?.when === 'under' ? Math.min(...values) : Math.max(...values);
		if (limit && crosses(limit, extreme)) {
			return [overLimit(rule.id, grade, moment, extreme, limit, sentence(rule, moment, extreme, limit))];
		}
	}
	return [];
}

function sentence({ what }: AbsoluteRule, moment: Moment, value: number, limit: Limit): string {
	const crossing = CROSSING_WORDS[limit.when];
	return `The ${what} ${MOMENT_WORDS[moment]} is ${plain(value)} ${limit.unit}, ${crossing} the limit of ${plain(limit.value)}.`;
}

/**
 * The readings before and after are both expected to carry the value. Exertion is asked for once, in effort or
 * after it.
 */
function lacks(rule: AbsoluteRule, { before, during, after }: Facts): boolean {
	if (rule.before === null) {
		return [...during, after].every((placed) => rule.value(placed) === null);
	}
	return rule.value(before) === null || rule.value(after) === null;
}
