/**
 * What a clearance was at an earlier time, replayed from its moves. A session is judged by what was in force when
 * it happened, not when somebody came to write it down.
 */
import type { ClearanceState } from '../core/codes';
import type { Instant, LocalDate } from '../core/time';
import type { ClearanceLimits } from './forms';
import { isInForce } from './states';

/** One move of one clearance, as it is on record. */
export interface RecordedMove {
	at: Instant;
	fromState: ClearanceState | null;
	toState: ClearanceState;
	limits: ClearanceLimits | null;
	reviewOn: string | null;
}

/** How a clearance stood. */
export interface Standing {
	state: ClearanceState;
	limits: ClearanceLimits | null;
	reviewOn: string | null;
	/** The ask was taken back before anybody decided: then it never permitted or held anything. */
	takenBack: boolean;
}

/**
 * How a clearance stood during a session. What was in force when the session began counts for all of it, even
 * when it was withdrawn meanwhile; what was given before the session ended counts as well, because the answer to
 * an ask from the bedside arrives while the patient waits. A move at the very instant has been made.
 * @param moves of one clearance, the oldest first
 * @param day of the beginning in the zone of the hospital; a review date before it ended the clearance
 * @returns null when it had not been asked for yet
 */
export function standingDuring(
	moves: readonly RecordedMove[],
	span: { startedAt: Instant; endedAt: Instant },
	day: LocalDate
): Standing | null {
	const made = moves.findLast((move) => move.at <= span.startedAt) ?? null;
	if (made !== null && inForceOn(made, day)) {
		return standingAfter(made);
	}
	const given = moves.find(
		(move) => move.at > span.startedAt && move.at <= span.endedAt && inForceOn(move, day)
	);
	const counting = given ?? made;
	return counting && standingAfter(counting);
}

function inForceOn({ toState, reviewOn }: RecordedMove, day: LocalDate): boolean {
	return isInForce({ state: toState, reviewOn }, day);
}

function standingAfter({ fromState, toState, limits, reviewOn }: RecordedMove): Standing {
	return {
		state: toState,
		limits,
		reviewOn,
		takenBack: fromState === 'asked' && toState === 'withdrawn'
	};
}
