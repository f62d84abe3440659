import { armLimitOf } from '../bedside/limits/arms';
import { limitsFor, type LimitSet } from '../bedside/limits/limits';
import type { Approach } from '../core/codes';
import { addDays, type LocalDate } from '../core/time';

/** Eight weeks; published advice runs from 6 to 12 weeks, so the end is a surgeon's decision and this only a date to ask. */
export const STERNAL_DAYS = 56;
/** When a decision did not end them it falls due again: common practice, no published source. */
export const REVIEW_AGAIN_DAYS = 14;

/** What precautions are known from: an operation that has begun, one that is to come, or none on record. */
export type PrecautionsBasis = 'performed' | 'planned' | 'none';

export interface Precautions {
	/** Without an operation that has begun nothing can be said: then their absence is no statement either. */
	basis: PrecautionsBasis;
	/** True after a sternotomy until somebody ends the precautions. */
	sternal: boolean;
	/** The day on which ending them should be asked for. */
	endDue: LocalDate | null;
	/** Arm elevation allowed now, degrees; null without a limit. */
	maxElevationDeg: number | null;
	/** What the arms may lift, kg; null where none is stated, and then nothing is lifted, pushed or pulled. */
	maxLoadKg: number | null;
	/** The arm stage is cleared, and until which day where it has one. */
	armStage: { reviewOn: LocalDate | null } | null;
}

/**
 * What to beware of. Before the operation its precautions do not hold yet.
 * @param armStage the arm stage in force, or null
 * @param ended whether ending the precautions was cleared
 * @param limits those that judge the patient: how high an arm may go is the same here as in the rules
 */
export function precautionsOf(
	operation: { approach: Approach; day: LocalDate; begun: boolean } | null,
	armStage: { maxElevationDeg: number | null; maxLoadKg: number | null; reviewOn: LocalDate | null } | null,
	ended: boolean,
	limits: LimitSet = limitsFor('strict')
): Precautions {
	const basis = basisOf(operation);
	if (!operation || basis !== 'performed' || operation.approach !== 'sternotomy' || ended) {
		return {
			basis,
			sternal: false,
			endDue: null,
			maxElevationDeg: null,
			maxLoadKg: null,
			armStage: null
		};
	}
	return {
		basis,
		sternal: true,
		endDue: addDays(operation.day, STERNAL_DAYS),
		maxElevationDeg: armLimitOf(limits, armStage)?.value ?? null,
		maxLoadKg: armStage?.maxLoadKg ?? null,
		armStage: armStage && { reviewOn: armStage.reviewOn }
	};
}

function basisOf(operation: { begun: boolean } | null): PrecautionsBasis {
	if (operation === null) {
		return 'none';
	}
	return operation.begun ? 'performed' : 'planned';
}

/** Whether their end waits on the surgeon on that day of the hospital's calendar. */
export function endFallsDue({ sternal, endDue }: Precautions, today: LocalDate): boolean {
	return sternal && endDue !== null && endDue <= today;
}

/** Whether precautions hold, or nobody can say that they do not: what a bedside goes by. */
export function mayHold({ basis, sternal }: Pick<Precautions, 'basis' | 'sternal'>): boolean {
	return sternal || basis !== 'performed';
}
