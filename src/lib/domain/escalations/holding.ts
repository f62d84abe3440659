import type { EscalationState, Grade } from '../core/codes';
import { HOUR, MINUTE, SECOND } from '../core/time';
import { hurried } from './needed-by';

/**
 * What runs while somebody has an escalation: none must die in a pocket, whatever its grade. Its holder is asked
 * when they are not at the bedside in time, and a while later the chain goes on; they stay the holder until another
 * takes. All times are common practice, no published source.
 */

/** A thumb that slipped can take back within this time, to the millisecond. */
export const UNDO_MS = 5 * SECOND;
/** After it the others hear that somebody has it: until then a slip could still be taken back. */
export const NOTICE_AFTER_MS = UNDO_MS;
interface Patience {
	/** From the taking, when the holder gave no minutes. */
	withoutWordMs: number;
	/** Beyond the minutes that the holder gave. */
	graceMs: number;
	/** From the question until the next ones are told, when the holder does not answer. */
	answerMs: number;
}

/** How long a holder is waited for: as the chain does, the lesser grades give more time. */
const PATIENCE: Record<Grade, Patience> = {
	high: { withoutWordMs: 10 * MINUTE, graceMs: 5 * MINUTE, answerMs: MINUTE },
	medium: { withoutWordMs: 30 * MINUTE, graceMs: 30 * MINUTE, answerMs: 5 * MINUTE },
	low: { withoutWordMs: 4 * HOUR, graceMs: 4 * HOUR, answerMs: 30 * MINUTE }
};

/**
 * When the holder is asked whether they are at the bedside: some time after the minutes they gave have run out, or
 * after taking when they gave none, and at the latest when somebody is needed.
 * @param since when it was taken, or when the minutes were given, milliseconds UTC
 * @param neededBy milliseconds UTC; null where the caller did not say
 */
export function askHolderAt(
	grade: Grade,
	since: number,
	etaMinutes: number | null,
	neededBy: number | null
): number {
	const { withoutWordMs, graceMs } = PATIENCE[grade];
	return hurried(
		since + (etaMinutes === null ? withoutWordMs : etaMinutes * MINUTE + graceMs),
		neededBy,
		since
	);
}

/** How long after the question the chain goes on without an answer, milliseconds. */
export function goOnAfterMs(grade: Grade): number {
	return PATIENCE[grade].answerMs;
}

export interface Held {
	state: EscalationState;
	takenBy: string | null;
	holderAskedAt: number | null;
	nextStepAt: number | null;
}

/** Somebody has it, and the chain goes on all the same: they did not come in time, or it became worse. */
export function isSoughtAnew({ state, nextStepAt }: Pick<Held, 'state' | 'nextStepAt'>): boolean {
	return state === 'taken' && nextStepAt !== null;
}

/**
 * May this person take it as it stands? Untaken: whoever may take at all. Taken, with the chain going on: anybody
 * but a holder who did not come, who has to be there instead. A holder may take a graver grade anew.
 */
export function isOpenTo(held: Held, personId: string): boolean {
	if (held.state === 'raised') {
		return true;
	}
	return isSoughtAnew(held) && (held.takenBy !== personId || held.holderAskedAt === null);
}

/** When the holder said to be there, milliseconds UTC; null when they did not say. */
export function etaOf(held: {
	etaMinutes: number | null;
	etaGivenAt: number | null;
	takenAt: number | null;
}) {
	const from = held.etaGivenAt ?? held.takenAt;
	return held.etaMinutes === null || from === null ? null : from + held.etaMinutes * MINUTE;
}

/** Was the holder asked whether they are there, and has not answered? */
export function askedOf({ state, holderAskedAt }: Pick<Held, 'state' | 'holderAskedAt'>): boolean {
	return state === 'taken' && holderAskedAt !== null;
}
