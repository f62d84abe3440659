import { exact } from '../bedside/numbers';

/**
 * Is a fall of the pressure on rising orthostatic hypotension? 20 systolic or 10 diastolic within three minutes of
 * standing after lying (30 systolic where the pressure was high lying down): consensus of 2011, as summarised.
 * Measured from sitting to standing 15 or 7 count: Shaw 2017. Exactly at a figure counts. The response rule
 * `postural-fall` judges sessions; this names the finding for a measurement made on purpose, after five minutes
 * lying down.
 */
export const ORTHOSTATIC_CRITERIA = {
	'lying-to-standing': { systolic: 20, diastolic: 10 },
	'high-lying-to-standing': { systolic: 30, diastolic: null },
	'sitting-to-standing': { systolic: 15, diastolic: 7 }
} as const;
export type OrthostaticCriterion = keyof typeof ORTHOSTATIC_CRITERIA;

interface Pressure {
	/** mmHg */
	readonly sbp: number;
	/** mmHg */
	readonly dbp: number;
}

export interface Orthostatic {
	/** How far each has fallen, mmHg; negative where it rose. */
	readonly systolicFall: number;
	readonly diastolicFall: number;
	readonly positive: boolean;
}

/** Compare the pressure before rising with the lowest within three minutes after. */
export function orthostatic(criterion: OrthostaticCriterion, before: Pressure, after: Pressure): Orthostatic {
	const { systolic, diastolic } = ORTHOSTATIC_CRITERIA[criterion];
	const [systolicFall, diastolicFall] = [exact(before.sbp - after.sbp), exact(before.dbp - after.dbp)];
	const positive = systolicFall >= systolic || (diastolic !== null && diastolicFall >= diastolic);
	return { systolicFall, diastolicFall, positive };
}
