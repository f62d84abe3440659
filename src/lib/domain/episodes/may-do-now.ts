import type { ClearanceKind, ClearanceState, Level, Rhythm } from '../core/codes';
import { mayHold, type Precautions } from './precautions';

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

/** What decides and can be missing from the record, in the order in which it is asked for. */
export const DECIDING = ['operation', 'drug', 'rhythm'] as const;
export type Deciding = (typeof DECIDING)[number];

/**
 * What decides on what a patient may do and is not known: it has to be said before any permission. Without an
 * operation on record nobody can say that no precautions hold, as the bedside goes by. The pulse decides on exercise
 * in the programme, and is read with the drug and the rhythm; on the ward the level decides, and they are asked at
 * each session.
 */
export function notKnown(about: {
	phase: 'inpatient' | 'outpatient';
	precautions: Pick<Precautions, 'basis' | 'sternal'>;
	betaBlocked: boolean | null;
	rhythm: Rhythm | null;
}): Deciding[] {
	const { phase, precautions, betaBlocked, rhythm } = about;
	const missing: Record<Deciding, boolean> = {
		operation: precautions.basis === 'none' && mayHold(precautions),
		drug: phase === 'outpatient' && betaBlocked === null,
		rhythm: phase === 'outpatient' && rhythm === null
	};
	return DECIDING.filter((each) => missing[each]);
}
