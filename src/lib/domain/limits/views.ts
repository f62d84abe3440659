import type { LimitKey, SetName } from '../bedside/codes';
import type { PrescribingMethod } from '../bedside/limits/prescribed';
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

/** A range that was prescribed for an outpatient, or, without a method, the end of one. */
export interface RangeLine {
	id: string;
	version: number;
	hrMin: number | null;
	hrMax: number | null;
	rpeMin: number | null;
	rpeMax: number | null;
	method: PrescribingMethod | null;
	note: string | null;
	prescribedBy: string;
	/** RFC 3339 */
	prescribedAt: string;
	inForce: boolean;
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
