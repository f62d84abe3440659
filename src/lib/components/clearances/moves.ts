import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import type { ClearanceView } from '$lib/domain/clearances/views';

/** Which moves a page offers. */
export interface Moves {
	/**
	 * The first decision stands open in view; another one, on what was given already, is behind a word, and so is one
	 * on what was asked back and not answered yet.
	 */
	give: 'first' | 'unanswered' | 'again' | null;
	withhold: boolean;
	hold: boolean;
	/** Taking back one's own ask, or what was decided. */
	withdraw: 'ask' | 'decision' | null;
	/** A question instead of a decision, while none waits for its answer. */
	askBack: boolean;
	/** The answer to the question that waits. */
	answer: boolean;
}

type About = Pick<ClearanceView, 'kind' | 'state' | 'current' | 'askedById' | 'questions'>;

/**
 * What a person may do about a clearance as it stands. What counts from an earlier operation can only end: giving
 * it would permit nothing.
 */
export function movesOf(viewer: Person, unitId: string, about: About): Moves {
	const { kind, state, current, askedById } = about;
	const waits = state === 'asked' && about.questions.some(({ answer }) => answer === null);
	const decides = can(viewer, 'clearance.decide', { unitId, clearanceKind: kind });
	const undecided = state === 'asked' || state === 'on-hold';
	const given = state === 'given' || state === 'given-with-limits';
	return {
		give: !decides || !current ? null : undecided ? (waits ? 'unanswered' : 'first') : given ? 'again' : null,
		withhold: decides && undecided,
		hold: decides && given,
		withdraw: withdrawal(decides, state === 'asked', given || state === 'on-hold', askedById === viewer.id),
		askBack: decides && state === 'asked' && !waits,
		answer: waits && can(viewer, 'clearance.ask', { unitId })
	};
}

function withdrawal(decides: boolean, asked: boolean, decided: boolean, own: boolean): Moves['withdraw'] {
	if (asked) {
		return own ? 'ask' : null;
	}
	return decides && decided ? 'decision' : null;
}
