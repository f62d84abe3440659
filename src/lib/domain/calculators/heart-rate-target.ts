/**
 * Target heart rates by the reserve: resting rate plus a fraction of what lies between it and the maximum. The
 * maximum is predicted from age by a named method, and the methods differ by more than forty beats at 65 years,
 * so a target without its method says nothing.
 *
 * Reserve: academic.whitworth.edu/hs433/heart_rate_reserve.htm. 220-age: standard deviation 10 to 12 beats
 * (MSSE, May 2007). 208-0.7age: Zhu 2010. 164-0.7age: Brawner 2004, for patients with coronary disease on a
 * beta-blocker, in sinus rhythm, aged 40 to 80, standard error 18 beats.
 */
import type { HeartRateTargetInput } from './forms';

export const MAXIMUM_METHODS = ['220-age', '208-0.7age', '164-0.7age'] as const;
export type MaximumMethod = (typeof MAXIMUM_METHODS)[number];

interface Method {
	readonly from: number;
	readonly perYear: number;
	/** Ages the method was made for. */
	readonly ages: readonly [number, number] | null;
	readonly words: string;
}

export const METHODS: Readonly<Record<MaximumMethod, Method>> = {
	'220-age': { from: 220, perYear: 1, ages: null, words: 'General; standard deviation 10 to 12 beats.' },
	'208-0.7age': { from: 208, perYear: 0.7, ages: null, words: 'General, healthy adults.' },
	'164-0.7age': {
		from: 164,
		perYear: 0.7,
		ages: [40, 80],
		words: 'Coronary disease on a beta-blocker, sinus rhythm; standard error 18 beats.'
	}
};

export interface HeartRateTarget {
	/** Predicted maximum, beats/min. */
	readonly maximum: number;
	/** One target for each fraction, in its order, beats/min. */
	readonly targets: readonly number[];
	readonly method: MaximumMethod;
	/** False where the method was not made for this age. */
	readonly inRange: boolean;
}

/** The maximum heart rate a method predicts at an age, beats/min. */
export function predictedMaximum(method: MaximumMethod, age: number): number {
	const { from, perYear } = METHODS[method];
	return from - perYear * age;
}

/** Targets by heart-rate reserve. The caller has checked that the resting rate lies below the maximum. */
export function heartRateTarget({ age, resting, method, fractions }: HeartRateTargetInput): HeartRateTarget {
	const maximum = predictedMaximum(method, age);
	const { ages } = METHODS[method];
	return {
		maximum,
		targets: fractions.map((fraction) => resting + fraction * (maximum - resting)),
		method,
		inRange: ages === null || (age >= ages[0] && age <= ages[1])
	};
}

/** How much of the reserve a heart rate takes up, in per cent. */
export function reservePercent(hr: number, resting: number, maximum: number): number {
	return ((hr - resting) / (maximum - resting)) * 100;
}

/**
 * The maximum predicted for heart failure on a beta-blocker, beats/min: Keteyian 2012, standard error 18 beats. On
 * a cycle it lies 5 lower.
 */
export function heartFailureMaximum(age: number, resting: number, mode: 'treadmill' | 'cycle'): number {
	return 119 + 0.5 * resting - 0.5 * age - (mode === 'cycle' ? 5 : 0);
}

/** What an inpatient may rise by after heart surgery, beats/min: inpatient line of the ACSM, secondary source. */
export const INPATIENT_RISE = 30;

/** The highest rate of an inpatient in effort: rest and the rise, and never over the cap of the set. */
export function inpatientCeiling(resting: number, cap: number): number {
	return Math.min(resting + INPATIENT_RISE, cap);
}
