/**
 * The default limits, one table per set. 'Over' and 'under' are strict, 'at' includes the limit itself. A unit or
 * a physician may change a value (`limits.ts`); what stands here is what holds until somebody does. A limit that
 * is null is off in that set.
 *
 * When a default or a rule changes, raise `DEFAULTS_VERSION`: findings are stored with the version that made them.
 */
import type { LimitKey, SetName } from '../codes';
import type { SourceId } from './sources';

export const DEFAULTS_VERSION = '2';

/** How a measured value crosses a limit. */
export type Crossing = 'over' | 'at' | 'under';

export interface DefaultLimit {
	readonly value: number;
	readonly when: Crossing;
	readonly unit: string;
	readonly source: SourceId;
}

type Table = Readonly<Record<LimitKey, DefaultLimit | null>>;

const over = (value: number, unit: string, source: SourceId): DefaultLimit => ({
	value,
	when: 'over',
	unit,
	source
});
const at = (value: number, unit: string, source: SourceId): DefaultLimit => ({
	value,
	when: 'at',
	unit,
	source
});
const under = (value: number, unit: string, source: SourceId): DefaultLimit => ({
	value,
	when: 'under',
	unit,
	source
});

const MMHG = 'mmHg';
const BEATS = 'beats/min';
const BREATHS = 'breaths/min';
const BORG = 'Borg 6-20';
const OF_TEN = 'of 10';

const STRICT: Table = {
	'systolic-ceiling': over(200, MMHG, 'inpatient-stop'),
	'systolic-ceiling.before': over(180, MMHG, 'rest-contraindications'),
	'systolic-ceiling.caution': over(180, MMHG, 'common-practice'),
	'systolic-floor': under(90, MMHG, 'early-mobilisation'),
	'mean-floor': under(60, MMHG, 'early-mobilisation'),
	'diastolic-ceiling': at(110, MMHG, 'inpatient-stop'),
	'diastolic-ceiling.before': at(110, MMHG, 'rest-contraindications'),
	'diastolic-ceiling.caution': at(100, MMHG, 'common-practice'),
	'heart-rate-ceiling': over(130, BEATS, 'inpatient-stop'),
	'heart-rate-ceiling.before': over(120, BEATS, 'rest-tachycardia'),
	'heart-rate-ceiling.caution': over(120, BEATS, 'inpatient-dose'),
	'heart-rate-floor': under(40, BEATS, 'early-mobilisation'),
	'heart-rate-floor.caution': under(50, BEATS, 'rest-rate-call'),
	'respiratory-ceiling': over(35, BREATHS, 'common-practice'),
	'respiratory-ceiling.before': over(30, BREATHS, 'common-practice'),
	'respiratory-ceiling.caution': over(30, BREATHS, 'common-practice'),
	'respiratory-ceiling.before-caution': over(24, BREATHS, 'common-practice'),
	'saturation-floor': under(88, '%', 'early-mobilisation'),
	'saturation-floor.caution': under(90, '%', 'ward-saturation'),
	'exertion-ceiling': over(15, BORG, 'common-practice'),
	'exertion-ceiling.caution': over(13, BORG, 'inpatient-dose'),
	'pain-ceiling': at(7, OF_TEN, 'common-practice'),
	'pain-ceiling.caution': at(4, OF_TEN, 'common-practice'),
	'temperature-ceiling': over(38.5, '°C', 'early-mobilisation'),
	'temperature-ceiling.caution': over(38, '°C', 'rest-contraindications'),
	'systolic-fall': over(10, MMHG, 'textbook-strict'),
	'systolic-stage-fall': over(10, MMHG, 'stress-test'),
	'systolic-rise': over(30, MMHG, 'textbook-strict'),
	'heart-rate-rise': over(20, BEATS, 'textbook-strict'),
	'heart-rate-rise.beta-blocked': over(12, BEATS, 'textbook-strict'),
	'heart-rate-fall': over(10, BEATS, 'common-practice'),
	'saturation-fall': at(4, '%', 'oximetry'),
	'postural-fall': over(30, MMHG, 'common-practice'),
	'postural-fall.systolic': at(20, MMHG, 'orthostatic-consensus'),
	'postural-fall.diastolic': at(10, MMHG, 'orthostatic-consensus'),
	'arm-elevation': over(45, 'degrees', 'common-practice'),
	'arm-elevation.cleared': over(90, 'degrees', 'arm-height'),
	'symptom.breathlessness': at(3, 'grade 1-4', 'dyspnoea-scale')
};

const GUIDELINE: Table = {
	...STRICT,
	'systolic-fall': over(10, MMHG, 'inpatient-stop'),
	'systolic-rise': null,
	'heart-rate-rise': over(30, BEATS, 'inpatient-stop'),
	'heart-rate-rise.beta-blocked': over(30, BEATS, 'inpatient-stop')
};

/** The prescribed range of a patient, where there is one, takes the place of the rate and exertion limits. */
const OUTPATIENT: Table = {
	...STRICT,
	'systolic-ceiling': over(250, MMHG, 'stress-test'),
	'systolic-ceiling.caution': over(220, MMHG, 'common-practice'),
	'diastolic-ceiling': over(115, MMHG, 'stress-test'),
	'systolic-fall': over(10, MMHG, 'stress-test'),
	'systolic-rise': null,
	'heart-rate-rise': null,
	'heart-rate-rise.beta-blocked': null
};

export const DEFAULT_LIMITS: Readonly<Record<SetName, Table>> = {
	strict: STRICT,
	guideline: GUIDELINE,
	outpatient: OUTPATIENT
};

/** The share of a change limit from which a set already asks for caution; null where it waits for the limit. */
export const CAUTION_SHARE: Readonly<Record<SetName, number | null>> = {
	strict: 0.8,
	guideline: null,
	outpatient: null
};
