import type { PrescribedRange, PrescribingMethod } from '../domain/bedside/limits/prescribed';
import { m } from './paraglide/messages';

export const METHOD_WORDS: Record<PrescribingMethod, () => string> = {
	'exercise-test': m.limits_method_exercise_test,
	'walk-test': m.limits_method_walk_test,
	'220-age': m.limits_method_220,
	'208-0.7age': m.limits_method_208,
	'164-0.7age': m.limits_method_164,
	'rest-plus': m.limits_method_rest_plus,
	'exertion-alone': m.limits_method_exertion,
	other: m.limits_method_other
};

type Ends = { [key in 'hrMin' | 'hrMax' | 'rpeMin' | 'rpeMax']?: number | null | undefined };

/** A range in words, with how it was found: `pulse 85 to 108, exertion 11 to 13; six-minute walk`. */
export function rangeWords(range: Ends & Pick<PrescribedRange, 'method'>): string {
	const { hrMin = null, hrMax = null, rpeMin = null, rpeMax = null, method } = range;
	const parts = [
		...(ends(hrMin, hrMax) ? [m.limits_range_pulse({ ends: ends(hrMin, hrMax) })] : []),
		...(ends(rpeMin, rpeMax) ? [m.limits_range_exertion({ ends: ends(rpeMin, rpeMax) })] : [])
	];
	return `${parts.join(', ')}; ${METHOD_WORDS[method]()}`;
}

function ends(from: number | null, to: number | null): string {
	if (from !== null && to !== null) {
		return m.limits_range_from_to({ from, to });
	}
	return from !== null ? m.limits_range_from({ from }) : to !== null ? m.limits_range_to({ to }) : '';
}
