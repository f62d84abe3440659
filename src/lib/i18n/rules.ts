import type { RuleId } from '../domain/bedside/codes';
import { m } from './paraglide/messages';

/** Rules by a name for people; the identifier is for programs. */
export const RULE_NAMES: Record<RuleId, () => string> = {
	'systolic-ceiling': m.bedside_rule_systolic_ceiling,
	'systolic-floor': m.bedside_rule_systolic_floor,
	'mean-floor': m.bedside_rule_mean_floor,
	'diastolic-ceiling': m.bedside_rule_diastolic_ceiling,
	'heart-rate-ceiling': m.bedside_rule_heart_rate_ceiling,
	'heart-rate-floor': m.bedside_rule_heart_rate_floor,
	'respiratory-ceiling': m.bedside_rule_respiratory_ceiling,
	'saturation-floor': m.bedside_rule_saturation_floor,
	'exertion-ceiling': m.bedside_rule_exertion_ceiling,
	'pain-ceiling': m.bedside_rule_pain_ceiling,
	'temperature-ceiling': m.bedside_rule_temperature_ceiling,
	'start-check': m.bedside_rule_start_check,
	'systolic-fall': m.bedside_rule_systolic_fall,
	'systolic-stage-fall': m.bedside_rule_systolic_stage_fall,
	'systolic-rise': m.bedside_rule_systolic_rise,
	'heart-rate-rise': m.bedside_rule_heart_rate_rise,
	'heart-rate-fall': m.bedside_rule_heart_rate_fall,
	'saturation-fall': m.bedside_rule_saturation_fall,
	'postural-fall': m.bedside_rule_postural_fall,
	'rhythm-caveat': m.bedside_rule_rhythm_caveat,
	symptom: m.bedside_rule_symptom,
	'new-rhythm': m.bedside_rule_new_rhythm,
	'reading-missing': m.bedside_rule_reading_missing,
	'arm-elevation': m.bedside_rule_arm_elevation,
	'clearance-missing': m.bedside_rule_clearance_missing,
	'not-following': m.bedside_rule_not_following,
	airway: m.bedside_rule_airway,
	'helper-missing': m.bedside_rule_helper_missing,
	'beta-blocker-unknown': m.bedside_rule_beta_blocker_unknown
};
