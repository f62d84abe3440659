import type { LimitKey, SetName } from '../bedside/codes';
import type { UnitChange } from '../bedside/limits/layers';

/** A change of a unit as its history shows it. */
export interface UnitChangeLine extends UnitChange {
	id: string;
	/** Who entered it. */
	changedBy: string;
	/** RFC 3339 */
	changedAt: string;
}

/** What a unit's inpatients are judged by, and what it changed, newest first. */
export interface UnitLimits {
	unit: { id: string; name: string };
	inpatientSet: SetName;
	changes: UnitChangeLine[];
}

/** A limit of one patient, in force or not. */
export interface PatientLimitLine {
	id: string;
	version: number;
	key: LimitKey;
	value: number;
	reason: string;
	/** The last day on which it holds. */
	untilOn: string;
	setBy: string;
	/** RFC 3339 */
	setAt: string;
	endedBy: string | null;
	endedAt: string | null;
	inForce: boolean;
}
