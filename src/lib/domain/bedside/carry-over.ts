/** What one recorded session says about the patient beyond itself: the level reached, and a re-check that was owed. */
import type { Level, Rhythm } from '../core/codes';
import { activityByCode } from './activities/activities';
import type { Outcome } from './codes';
import type { ActivityDone, Assessment, Reading } from './forms';

/**
 * The level of a patient after a session. It rises only by a session that went well (clear, or with a caution) in
 * which something of that level, or harder, was really done; it never falls here, because going back is somebody's
 * decision.
 */
export function levelAfter(
	reached: number,
	session: { level: Level; outcome: Outcome; activities: readonly ActivityDone[] }
): number {
	const wentWell = session.outcome === 'clear' || session.outcome === 'caution';
	const proven = session.activities.some(
		({ code, notDone }) => !notDone && activityByCode(code).level >= session.level
	);
	return wentWell && proven ? Math.max(reached, session.level) : reached;
}

/**
 * Today's level after a session recorded by somebody who may decide on levels. Treating one level up and doing it well
 * is going up; a jump nobody makes by the way, and after a caution a junior stays where the patient was. What does not
 * count here still shows as reached, and waits for a decision.
 */
export function todayAfter(
	today: number,
	session: Parameters<typeof levelAfter>[1],
	senior: boolean
): number {
	const held = session.level > today + 1 || (session.outcome === 'caution' && !senior);
	return held ? today : levelAfter(today, session);
}

/** The rhythm that a session ended with: the last one that a reading states, else the one asked for at its begin. */
export function rhythmAtEnd({
	context,
	before,
	during,
	after
}: Pick<Assessment, 'context' | 'before' | 'during' | 'after'>): Rhythm {
	const stated = [after, ...during.toReversed(), before].map(({ rhythm }) => rhythm);
	return stated.find((rhythm) => rhythm != null) ?? context.rhythm;
}

/** True when the session can stand for measuring again: a pulse or a pressure was taken in it. */
export function measuresAgain(session: {
	before: Reading;
	during: readonly Reading[];
	after: Reading;
}): boolean {
	return [session.before, ...session.during, session.after].some(
		({ hr, sbp, dbp }) => hr != null || sbp != null || dbp != null
	);
}
