import type { ClearanceHeadline } from '../domain/clearances/states';
import type { ClearanceKind, Priority, ReferralState, Service } from '../domain/core/codes';
import { m } from './paraglide/messages';

/** The words for codes, one record for each closed list: a new code does not compile until it has its word. */
export const SERVICE_WORDS: Record<Service, () => string> = {
	physiotherapy: m.referrals_service_physiotherapy,
	'speech-therapy': m.referrals_service_speech_therapy,
	'outpatient-programme': m.referrals_service_outpatient_programme
};

export const PRIORITY_WORDS: Record<Priority, () => string> = {
	routine: m.referrals_priority_routine,
	soon: m.referrals_priority_soon,
	urgent: m.referrals_priority_urgent
};

export const REFERRAL_STATE_WORDS: Record<ReferralState, () => string> = {
	asked: m.referrals_state_asked,
	accepted: m.referrals_state_accepted,
	declined: m.referrals_state_declined,
	closed: m.referrals_state_closed,
	withdrawn: m.referrals_state_withdrawn
};

export const CLEARANCE_WORDS: Record<ClearanceKind, () => string> = {
	'arm-stage': m.clearances_kind_arm_stage,
	'out-of-bed': m.clearances_kind_out_of_bed,
	corridor: m.clearances_kind_corridor,
	stairs: m.clearances_kind_stairs,
	'oral-intake': m.clearances_kind_oral_intake,
	treadmill: m.clearances_kind_treadmill,
	'precautions-end': m.clearances_kind_precautions_end,
	discharge: m.clearances_kind_discharge
};

export const HEADLINE_WORDS: Record<ClearanceHeadline, () => string> = {
	cleared: m.clearances_headline_cleared,
	'cleared-with-limits': m.clearances_headline_cleared_with_limits,
	'not-cleared': m.clearances_headline_not_cleared
};
