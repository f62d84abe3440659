import type { ClearanceLimits } from '$lib/domain/clearances/forms';
import { headline } from '$lib/domain/clearances/states';
import type { ClearanceKind, ClearanceState } from '$lib/domain/core/codes';
import { CLEARANCE_WORDS, HEADLINE_WORDS } from '$lib/i18n/labels';
import { limitWords } from '$lib/i18n/limits';
import { m } from '$lib/i18n/paraglide/messages';

/** What the ask says in the thread: kind, question, and the limits it proposes. */
export function askText(kind: ClearanceKind, question: string, proposed: ClearanceLimits | null): string {
	const ask = `${CLEARANCE_WORDS[kind]()}: ${question}`;
	const limits = limitWords(proposed).join(' · ');
	return limits === '' ? ask : `${ask} ${m.clearances_proposed({ limits })}`;
}

/** What the answer says in the thread: kind, headline, limits, review, reason. */
export function answerText(
	kind: ClearanceKind,
	state: ClearanceState,
	decision: {
		limits?: ClearanceLimits | null;
		reviewOn?: string | null;
		note?: string | null;
		reason: string | null;
	}
): string {
	const parts = [
		...limitWords(state === 'given-with-limits' ? (decision.limits ?? null) : null),
		decision.reviewOn ? m.clearances_review_on({ day: decision.reviewOn }) : '',
		decision.note ?? '',
		decision.reason ?? ''
	].filter((part) => part !== '');
	const head = `${CLEARANCE_WORDS[kind]()}: ${stateWord(state)}`;
	return parts.length > 0 ? `${head}. ${parts.join(' · ')}` : `${head}.`;
}

/**
 * What the thread says when a clearance lapsed.
 * @param reviewOn its last day, where it lapsed because that is past
 */
export function lapsedText(kind: ClearanceKind, reviewOn: string | null): string {
	const head = `${CLEARANCE_WORDS[kind]()}: ${stateWord('lapsed')}.`;
	return reviewOn === null ? head : `${head} ${m.clearances_entry_review_past({ day: reviewOn })}`;
}

/** The headline, and for what is not cleared the word that says why. */
function stateWord(state: ClearanceState): string {
	const head = HEADLINE_WORDS[headline(state)]();
	switch (state) {
		case 'withheld':
			return `${head}, ${m.clearances_state_withheld()}`;
		case 'on-hold':
			return `${head}, ${m.clearances_state_on_hold()}`;
		case 'lapsed':
			return `${head}, ${m.clearances_why_lapsed()}`;
		case 'withdrawn':
			return `${head}, ${m.clearances_state_withdrawn()}`;
		default:
			return head;
	}
}
