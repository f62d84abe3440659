import type { ClearanceKind, ClearanceState, Level } from '../core/codes';

export const PLACES = ['bed', 'chair', 'bathroom', 'corridor', 'stairs'] as const;
export type Place = (typeof PLACES)[number];
export type Help = 'alone' | 'one' | 'two' | 'not';
export type MayDoNow = Record<Place, Help>;

/** What a level allows where nobody has said otherwise: common practice, no published source. */
const BY_LEVEL: Record<Level, MayDoNow> = {
	1: { bed: 'one', chair: 'two', bathroom: 'not', corridor: 'not', stairs: 'not' },
	2: { bed: 'alone', chair: 'one', bathroom: 'one', corridor: 'not', stairs: 'not' },
	3: { bed: 'alone', chair: 'alone', bathroom: 'one', corridor: 'one', stairs: 'not' },
	4: { bed: 'alone', chair: 'alone', bathroom: 'alone', corridor: 'one', stairs: 'not' },
	5: { bed: 'alone', chair: 'alone', bathroom: 'alone', corridor: 'alone', stairs: 'not' },
	6: { bed: 'alone', chair: 'alone', bathroom: 'alone', corridor: 'alone', stairs: 'one' }
};

/** The places that a clearance governs. */
const GOVERNS: Partial<Record<ClearanceKind, Place[]>> = {
	'out-of-bed': ['chair', 'bathroom', 'corridor', 'stairs'],
	corridor: ['corridor'],
	stairs: ['stairs']
};

const STOPPED: readonly ClearanceState[] = ['withheld', 'on-hold', 'withdrawn', 'lapsed'];

/**
 * What the patient may do now, and with how many helpers. Stairs always need their clearance; the other places
 * follow the level until somebody withholds or holds them.
 * @param clearances the newest of each kind
 */
export function mayDoNow(
	level: Level,
	clearances: readonly { kind: ClearanceKind; state: ClearanceState }[]
): MayDoNow {
	const now = { ...BY_LEVEL[level] };
	const cleared = clearances.some((c) => c.kind === 'stairs' && c.state.startsWith('given'));
	if (!cleared) {
		now.stairs = 'not';
	}
	for (const { kind, state } of clearances) {
		for (const place of GOVERNS[kind] ?? []) {
			if (STOPPED.includes(state)) {
				now[place] = 'not';
			}
		}
	}
	return now;
}
