import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import type { ClearanceView } from '$lib/domain/clearances/views';

/** Which moves a page offers. */
export interface Moves {
	/** The first decision stands open in view; another one, on what was given already, is behind a word. */
	give: 'first' | 'again' | null;
	withhold: boolean;
	hold: boolean;
	/** Taking back one's own ask, or what was decided. */
	withdraw: 'ask' | 'decision' | null;
}

type About = Pick<ClearanceView, 'kind' | 'state' | 'current' | 'askedById'>;

/**
 * What a person may do about a clearance as it stands. What counts from an earlier operation can only end: giving
 * it would permit nothing.
 */
export function movesOf(viewer: Person, unitId: string, { kind, state, current, askedById }: About): Moves {
	const decides = can(viewer, 'clearance.decide', { unitId, clearanceKind: kind });
	const undecided = state === 'asked' || state === 'on-hold';
	const given = state === 'given' || state === 'given-with-limits';
	return {
		give: !decides || !current ? null : undecided ? 'first' : given ? 'again' : null,
		withhold: decides && undecided,
		hold: decides && given,
		withdraw: withdrawal(decides, state === 'asked', given || state === 'on-hold', askedById === viewer.id)
	};
}

function withdrawal(decides: boolean, asked: boolean, decided: boolean, own: boolean): Moves['withdraw'] {
	if (asked) {
		return own ? 'ask' : null;
	}
	return decides && decided ? 'decision' : null;
}
