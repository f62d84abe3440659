/**
 * The six-minute walk: the distance predicted from sex, age, height and weight, its lower limit, and what was
 * walked as a share of the prediction. The equations come from healthy people of 40 to 80 years and explain
 * less than half of what differs between them; stable patients with coronary disease walked further than
 * predicted. Without male or female there is no equation, and no number is made up.
 *
 * Equations: European Respiratory Journal, table of reference equations,
 * erj.ersjournals.com/highwire/markup/107615. Lower limits and age range: Enright and Sherrill 1998, from memory.
 */
import { exact } from '../bedside/numbers';
import type { WalkTestInput } from './forms';

export interface WalkTest {
	/** Metres; null without an equation. */
	readonly predictedM: number | null;
	readonly lowerLimitM: number | null;
	/** What was walked in per cent of the prediction; null when nothing was walked or nothing is predicted. */
	readonly percent: number | null;
	readonly belowLowerLimit: boolean | null;
	/** False outside the ages the equations were made for, or where there is no equation. */
	readonly inRange: boolean;
}

const AGES = { from: 40, to: 80 };
const LOWER_LIMIT_BELOW_M = { male: 153, female: 139 };

/** Predict a six-minute walk and, when a distance is given, compare it. */
export function walkTest(input: WalkTestInput): WalkTest {
	const { sex, ageYears, distanceM } = input;
	if (sex !== 'male' && sex !== 'female') {
		return { predictedM: null, lowerLimitM: null, percent: null, belowLowerLimit: null, inRange: false };
	}
	const predictedM = exact(predicted(sex, input));
	const lowerLimitM = exact(predictedM - LOWER_LIMIT_BELOW_M[sex]);
	return {
		predictedM,
		lowerLimitM,
		percent: distanceM == null || predictedM <= 0 ? null : (distanceM / predictedM) * 100,
		belowLowerLimit: distanceM == null ? null : distanceM < lowerLimitM,
		inRange: ageYears >= AGES.from && ageYears <= AGES.to
	};
}

function predicted(sex: 'male' | 'female', { heightCm, ageYears, weightKg }: WalkTestInput): number {
	return sex === 'male'
		? 7.57 * heightCm - 5.02 * ageYears - 1.76 * weightKg - 309
		: 2.11 * heightCm - 2.29 * weightKg - 5.78 * ageYears + 667;
}

/** Whom the smallest change that matters was measured in. */
export const MEANINGFUL_GROUPS = ['coronary', 'cardiac-pooled', 'heart-failure', 'respiratory'] as const;
export type MeaningfulChange = (typeof MEANINGFUL_GROUPS)[number];

/** The smallest change between two walks that patients notice, metres, by whom it was measured in. */
export const MEANINGFUL_CHANGES: Readonly<Record<MeaningfulChange, { metres: number; source: string }>> = {
	coronary: { metres: 25, source: 'Gremeaux 2011, coronary artery disease' },
	'cardiac-pooled': { metres: 23, source: 'Daynes 2025, pooled cardiac groups' },
	'heart-failure': { metres: 36, source: 'PubMed 25049008, heart failure' },
	respiratory: { metres: 30, source: 'ERS/ATS 2014 (from memory, not yet verified)' }
};

/** How two walks differ, metres, and whether the difference is one that matters. */
export function walkChange(
	beforeM: number,
	afterM: number,
	against: MeaningfulChange = 'coronary'
): { changeM: number; matters: boolean; thresholdM: number } {
	const thresholdM = MEANINGFUL_CHANGES[against].metres;
	const changeM = exact(afterM - beforeM);
	return { changeM, matters: Math.abs(changeM) >= thresholdM, thresholdM };
}
