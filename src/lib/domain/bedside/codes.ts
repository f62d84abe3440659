/**
 * The closed lists of the bedside: what a reading, a symptom, a rule and a finding may be called. Values are
 * fixed by the JSON API. Lists shared with other areas (rhythms, levels, clearance kinds) live in `core/codes`.
 */

/** Which of the three sets of limits judges a session. */
export const SETS = ['strict', 'guideline', 'outpatient'] as const;
export type SetName = (typeof SETS)[number];

export const PHASES = ['inpatient', 'outpatient'] as const;
export type Phase = (typeof PHASES)[number];

/** From low to high: a later member is a rise. */
export const POSTURES = ['lying', 'sitting', 'standing'] as const;
export type Posture = (typeof POSTURES)[number];

/** A cuff and an arterial line read differently, so their values are never compared with each other. */
export const PRESSURE_SOURCES = ['cuff', 'arterial'] as const;
export type PressureSource = (typeof PRESSURE_SOURCES)[number];

export const AIRWAYS = ['tube', 'tracheostomy', 'none'] as const;
export type Airway = (typeof AIRWAYS)[number];

export const ASSISTANCE = ['alone', 'one', 'two'] as const;
export type Assistance = (typeof ASSISTANCE)[number];

export const SYMPTOMS = [
	'dizziness',
	'light-headedness',
	'fainting',
	'angina',
	'wound-pain',
	'breathlessness',
	'palpitations',
	'pallor',
	'sweating',
	'nausea',
	'confusion',
	'distress',
	'sternal-click',
	'new-bleeding',
	'line-dislodged'
] as const;
export type SymptomCode = (typeof SYMPTOMS)[number];

/** The moment of a session that a finding speaks of. */
export const MOMENTS = ['before', 'during', 'after'] as const;
export type Moment = (typeof MOMENTS)[number];

/** Gravest first: the order of the array is the order of the findings. */
export const FINDING_GRADES = ['stop', 'caution', 'note'] as const;
export type FindingGrade = (typeof FINDING_GRADES)[number];

/** Gravest first. */
export const OUTCOMES = ['stop', 'incomplete', 'caution', 'clear'] as const;
export type Outcome = (typeof OUTCOMES)[number];

export const RULE_IDS = [
	'systolic-ceiling',
	'systolic-floor',
	'mean-floor',
	'diastolic-ceiling',
	'heart-rate-ceiling',
	'heart-rate-floor',
	'respiratory-ceiling',
	'saturation-floor',
	'exertion-ceiling',
	'pain-ceiling',
	'temperature-ceiling',
	'start-check',
	'systolic-fall',
	'systolic-stage-fall',
	'systolic-rise',
	'heart-rate-rise',
	'heart-rate-fall',
	'saturation-fall',
	'postural-fall',
	'rhythm-caveat',
	'symptom',
	'new-rhythm',
	'reading-missing',
	'arm-elevation',
	'clearance-missing',
	'not-following',
	'airway',
	'helper-missing',
	'beta-blocker-unknown'
] as const;
export type RuleId = (typeof RULE_IDS)[number];

/**
 * The numbers behind the rules, each by a name of its own so that a unit or a patient can have another. The
 * bare name of a rule is its stop limit (in effort and after, where `before` has one of its own).
 */
export const LIMIT_KEYS = [
	'systolic-ceiling',
	'systolic-ceiling.before',
	'systolic-ceiling.caution',
	'systolic-floor',
	'mean-floor',
	'diastolic-ceiling',
	'diastolic-ceiling.before',
	'diastolic-ceiling.caution',
	'heart-rate-ceiling',
	'heart-rate-ceiling.before',
	'heart-rate-ceiling.caution',
	'heart-rate-floor',
	'heart-rate-floor.caution',
	'respiratory-ceiling',
	'respiratory-ceiling.before',
	'respiratory-ceiling.caution',
	'respiratory-ceiling.before-caution',
	'saturation-floor',
	'saturation-floor.caution',
	'exertion-ceiling',
	'exertion-ceiling.caution',
	'pain-ceiling',
	'pain-ceiling.caution',
	'temperature-ceiling',
	'temperature-ceiling.caution',
	'systolic-fall',
	'systolic-stage-fall',
	'systolic-rise',
	'heart-rate-rise',
	'heart-rate-rise.beta-blocked',
	'heart-rate-fall',
	'saturation-fall',
	'postural-fall',
	'postural-fall.systolic',
	'postural-fall.diastolic',
	'arm-elevation',
	'arm-elevation.cleared',
	'symptom.breathlessness'
] as const;
export type LimitKey = (typeof LIMIT_KEYS)[number];
