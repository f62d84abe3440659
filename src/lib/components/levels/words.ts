import type { ProgressReason, Suggestion } from '$lib/domain/bedside/progress';
import { m } from '$lib/i18n/paraglide/messages';

/** What a session speaks for, naming the level it leads to. */
export const SUGGESTION_WORDS: Record<Suggestion, (inputs: { level: number }) => string> = {
	progress: m.levels_progress,
	stay: m.levels_stay,
	'step-back': m.levels_step_back
};

export const WEIGHT_WORDS: Record<ProgressReason['weight'], () => string> = {
	for: m.levels_for,
	against: m.levels_against,
	consider: m.levels_consider
};
