/**
 * How far a unit or a physician may move a limit. Not a clinical judgement: beyond it the number is a slip of the
 * finger, or would switch a rule off without saying so. Common practice, no published source.
 */
import type { LimitKey, RuleId } from '../codes';

interface Range {
	readonly low: number;
	readonly high: number;
}

const BY_RULE: Partial<Record<RuleId, Range>> = {
	'systolic-ceiling': { low: 100, high: 280 },
	'systolic-floor': { low: 60, high: 130 },
	'mean-floor': { low: 40, high: 90 },
	'diastolic-ceiling': { low: 60, high: 150 },
	'heart-rate-ceiling': { low: 60, high: 220 },
	'heart-rate-floor': { low: 30, high: 80 },
	'respiratory-ceiling': { low: 12, high: 60 },
	'saturation-floor': { low: 70, high: 98 },
	'exertion-ceiling': { low: 7, high: 20 },
	'pain-ceiling': { low: 1, high: 10 },
	'temperature-ceiling': { low: 36, high: 42 },
	'systolic-fall': { low: 2, high: 60 },
	'systolic-stage-fall': { low: 2, high: 60 },
	'systolic-rise': { low: 5, high: 120 },
	'heart-rate-rise': { low: 2, high: 80 },
	'heart-rate-fall': { low: 2, high: 60 },
	'saturation-fall': { low: 1, high: 20 },
	'postural-fall': { low: 5, high: 80 },
	'arm-elevation': { low: 0, high: 180 },
	symptom: { low: 1, high: 4 }
};

/** The lowest and the highest number a limit may be set to, in the unit of the limit. */
export function rangeOf(key: LimitKey): Range {
	const range = BY_RULE[key.split('.')[0] as RuleId];
	if (range === undefined) {
		throw new Error(`The limit '${key}' has no range.`);
	}
	return range;
}

/** What is wrong with a number for this limit, naming the field by its label, value and range; null when nothing is. */
export function limitFault(key: LimitKey, value: number): string | null {
	const { low, high } = rangeOf(key);
	return value >= low && value <= high
		? null
		: `New value: ${value} cannot be taken; write a number from ${low} to ${high}.`;
}
