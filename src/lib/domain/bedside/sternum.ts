/**
 * The breastbone. The stability scale runs from 0 (stable) to 3 (parted, moving freely): El-Ansary 2018; what 1
 * and 2 mean (slight; moderate, in part) and what follows from them is from memory and needs local consent. Loads
 * are given in pounds by some leaflets and in kilograms here.
 */
import { plain } from './numbers';

export const STERNAL_GRADES = [0, 1, 2, 3] as const;
export type SternalGrade = (typeof STERNAL_GRADES)[number];

export interface SternalAdvice {
	/** Tell the surgeon today. */
	readonly tellSurgeon: boolean;
	/** No arm work until the surgeon has seen it. */
	readonly stopArms: boolean;
}

/** What follows from a grade of stability, and from a new click, discharge or fever. */
export function sternalAdvice(grade: SternalGrade, newSign = false): SternalAdvice {
	return { tellSurgeon: grade >= 1 || newSign, stopArms: grade >= 2 };
}

/** Kilograms in a pound, by definition. */
const KG_PER_LB = 0.45359237;

/** A load of a leaflet in pounds, in kilograms. */
export function kilogramsOf(pounds: number): number {
	return pounds * KG_PER_LB;
}

/** How far arms may go for one patient, from the arm stage in force and its limits. */
export interface ArmsAllowed {
	/** Degrees from the side of the body. */
	readonly maxElevationDeg: number | null;
	/** Kilograms; null where no load is stated, and then nothing is lifted. */
	readonly maxLoadKg: number | null;
}

/**
 * What sternal precautions forbid: common practice, no published source; advice differs between hospitals.
 * @param allowed of one patient; left out, the lines speak of no figure
 */
export function sternalBans(allowed?: ArmsAllowed): string[] {
	return [
		'Pushing up through the arms.',
		'Pulling, or being pulled by an arm.',
		allowed?.maxElevationDeg == null
			? 'Lifting either arm above the height allowed.'
			: `Lifting either arm above ${plain(allowed.maxElevationDeg)} degrees.`,
		'Reaching behind the back.',
		'Leaning or lying on an arm.',
		'Crutches.',
		allowed === undefined
			? 'Lifting more than the load allowed.'
			: allowed.maxLoadKg === null
				? 'Lifting any load: none is stated as allowed.'
				: `Lifting more than ${plain(allowed.maxLoadKg)} kg.`
	];
}
