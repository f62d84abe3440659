import type { ClearanceKind } from '$lib/domain/core/codes';
import { m } from '$lib/i18n/paraglide/messages';

/** What a decider is asked, in one short question for each kind. */
export const QUESTION_WORDS: Record<ClearanceKind, () => string> = {
	'arm-stage': m.clearances_question_arm_stage,
	'out-of-bed': m.clearances_question_out_of_bed,
	corridor: m.clearances_question_corridor,
	stairs: m.clearances_question_stairs,
	'oral-intake': m.clearances_question_oral_intake,
	treadmill: m.clearances_question_treadmill,
	'precautions-end': m.clearances_question_precautions_end,
	discharge: m.clearances_question_discharge
};
