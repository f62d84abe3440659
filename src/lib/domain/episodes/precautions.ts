import type { Approach } from '../core/codes';
import { addDays, type LocalDate } from '../core/time';

/** Arms stay below this until the arm stage is cleared: common practice, no published source. */
export const ARM_LIMIT_BEFORE_CLEARANCE_DEG = 45;
/** Eight weeks; published advice runs from 6 to 12 weeks, so the end is a surgeon's decision and this only a date to ask. */
const STERNAL_DAYS = 56;

export interface Precautions {
	/** True after a sternotomy until somebody ends the precautions. */
	sternal: boolean;
	/** The day on which ending them should be asked for. */
	endDue: LocalDate | null;
	/** Arm elevation allowed now, degrees; null without a limit. */
	maxElevationDeg: number | null;
}

/**
 * What to beware of.
 * @param armStage the arm stage in force, or null
 * @param ended whether ending the precautions was cleared
 */
export function precautionsOf(
	operation: { approach: Approach; day: LocalDate } | null,
	armStage: { maxElevationDeg: number | null } | null,
	ended: boolean
): Precautions {
	if (!operation || operation.approach !== 'sternotomy' || ended) {
		return { sternal: false, endDue: null, maxElevationDeg: null };
	}
	return {
		sternal: true,
		endDue: addDays(operation.day, STERNAL_DAYS),
		maxElevationDeg: armStage ? (armStage.maxElevationDeg ?? 90) : ARM_LIMIT_BEFORE_CLEARANCE_DEG
	};
}
