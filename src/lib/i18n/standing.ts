import type { ClearanceState } from '../domain/core/codes';
import { m } from './paraglide/messages';

const WORDS: Record<ClearanceState, () => string> = {
	asked: m.clearances_why_asked,
	given: m.clearances_headline_cleared,
	'given-with-limits': m.clearances_headline_cleared_with_limits,
	withheld: m.clearances_state_withheld,
	'on-hold': m.clearances_state_on_hold,
	withdrawn: m.clearances_state_withdrawn,
	lapsed: m.clearances_why_lapsed
};

/** How a clearance stood, in the words of the screens; null when nobody had asked for it. */
export function stoodWords(stood: ClearanceState | null): string {
	return stood === null ? m.clearances_why_not_asked() : WORDS[stood]();
}
