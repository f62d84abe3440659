import type { Airway, Moment, Posture, PressureSource, SymptomCode } from '$lib/domain/bedside/codes';
import type { Rhythm } from '$lib/domain/core/codes';
import { m } from '$lib/i18n/paraglide/messages';
import type { DoseField, DrugAnswer, Response, StartCheck } from './draft';
import type { ReadingField } from './fields';

export const FIELD_LABELS: Record<ReadingField, () => string> = {
	sbp: m.bedside_field_sbp,
	dbp: m.bedside_field_dbp,
	hr: m.bedside_field_hr,
	spo2: m.bedside_field_spo2,
	rr: m.bedside_field_rr,
	rpe: m.bedside_field_rpe,
	pain: m.bedside_field_pain,
	oxygenLpm: m.bedside_field_oxygen,
	work: m.bedside_field_work
};

export const FIELD_UNITS: Record<ReadingField, () => string> = {
	sbp: m.bedside_unit_mmhg,
	dbp: m.bedside_unit_mmhg,
	hr: m.bedside_unit_beats,
	spo2: m.bedside_unit_percent,
	rr: m.bedside_unit_breaths,
	rpe: m.bedside_unit_borg,
	pain: m.bedside_unit_of_ten,
	oxygenLpm: m.bedside_unit_litres,
	work: m.bedside_unit_work
};

export const DOSE_LABELS: Record<DoseField, () => string> = {
	elevationDeg: m.bedside_dose_elevation,
	distanceM: m.bedside_dose_distance,
	minutes: m.bedside_dose_minutes,
	repetitions: m.bedside_dose_repetitions,
	steps: m.bedside_dose_steps,
	balls: m.bedside_dose_balls
};

export const DOSE_UNITS: Record<DoseField, () => string> = {
	elevationDeg: m.bedside_unit_degrees,
	distanceM: m.bedside_unit_metres,
	minutes: m.bedside_unit_minutes,
	repetitions: m.bedside_unit_times,
	steps: m.bedside_unit_steps,
	balls: m.bedside_unit_balls
};

export const MOMENT_LABELS: Record<Moment, () => string> = {
	before: m.bedside_before,
	during: m.bedside_during,
	after: m.bedside_after
};

export const POSTURE_WORDS: Record<Posture, () => string> = {
	lying: m.bedside_posture_lying,
	sitting: m.bedside_posture_sitting,
	standing: m.bedside_posture_standing
};

export const SOURCE_WORDS: Record<PressureSource, () => string> = {
	cuff: m.bedside_source_cuff,
	arterial: m.bedside_source_arterial
};

export const RHYTHM_WORDS: Record<Rhythm, () => string> = {
	sinus: m.bedside_rhythm_sinus,
	'atrial-fibrillation': m.bedside_rhythm_atrial_fibrillation,
	paced: m.bedside_rhythm_paced,
	other: m.bedside_rhythm_other
};

export const AIRWAY_WORDS: Record<Airway, () => string> = {
	none: m.bedside_airway_none,
	tube: m.bedside_airway_tube,
	tracheostomy: m.bedside_airway_tracheostomy
};

export const RESPONSE_WORDS: Record<Response, () => string> = {
	follows: m.bedside_responds_follows,
	awake: m.bedside_responds_awake,
	unconscious: m.bedside_responds_unconscious
};

export const DRUG_WORDS: Record<DrugAnswer, () => string> = {
	yes: m.bedside_drug_yes,
	no: m.bedside_drug_no,
	unknown: m.bedside_drug_unknown
};

export const START_CHECK_WORDS: Record<StartCheck, () => string> = {
	vasopressorRising: m.bedside_check_vasopressor,
	balloonPump: m.bedside_check_balloon_pump,
	pacingDependent: m.bedside_check_pacing,
	bleeding: m.bedside_check_bleeding
};

export const SYMPTOM_WORDS: Record<SymptomCode, () => string> = {
	dizziness: m.bedside_symptom_dizziness,
	'light-headedness': m.bedside_symptom_light_headedness,
	fainting: m.bedside_symptom_fainting,
	angina: m.bedside_symptom_angina,
	'wound-pain': m.bedside_symptom_wound_pain,
	breathlessness: m.bedside_symptom_breathlessness,
	palpitations: m.bedside_symptom_palpitations,
	pallor: m.bedside_symptom_pallor,
	sweating: m.bedside_symptom_sweating,
	nausea: m.bedside_symptom_nausea,
	confusion: m.bedside_symptom_confusion,
	distress: m.bedside_symptom_distress,
	'sternal-click': m.bedside_symptom_sternal_click,
	'new-bleeding': m.bedside_symptom_new_bleeding,
	'line-dislodged': m.bedside_symptom_line_dislodged
};

/** A closed list as options of a `Choice`. */
export function optionsOf<T extends string>(list: readonly T[], words: Record<T, () => string>) {
	return list.map((value) => ({ value, label: words[value]() }));
}
