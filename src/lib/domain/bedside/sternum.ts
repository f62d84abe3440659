/**
 * The breastbone. The stability scale runs from 0 (stable) to 3 (parted, moving freely): El-Ansary 2018; what 1
 * and 2 mean (slight; moderate, in part) and what follows from them is from memory and needs local consent. Loads
 * are given in pounds by some leaflets and in kilograms here.
 */
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

/** What sternal precautions forbid: common practice, no published source; advice differs between hospitals. */
export const STERNAL_BANS = [
	'Pushing up through the arms.',
	'Pulling, or being pulled by an arm.',
	'Lifting either arm above the height allowed.',
	'Reaching behind the back.',
	'Leaning or lying on an arm.',
	'Crutches.',
	'Lifting more than the load allowed.'
] as const;
