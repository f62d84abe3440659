import type { SetName } from '../domain/bedside/codes';
import { m } from './paraglide/messages';

/** What the sets of limits are called, on pages and in what the server refuses. */
export const SET_WORDS: Record<SetName, () => string> = {
	strict: m.home_rules_set_strict,
	guideline: m.home_rules_set_guideline,
	outpatient: m.home_rules_set_outpatient
};
