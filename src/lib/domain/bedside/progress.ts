/**
 * What speaks for going on to the next level and what holds a patient back, from one judged session. The therapist
 * decides; this gives the reasons. A session that stopped in effort speaks for going back a level, one that could
 * not start or could not be judged for staying. A session without a caution in which the heart answered as it
 * should speaks for progress. A systolic pressure that rises 10 to 40 mmHg above rest is what progress is usually
 * made on; at the low levels there is too little work to show it, so that a smaller rise is said and holds nobody.
 *
 * Criteria: step programmes in the AACVPR line, from memory, not yet verified.
 */
import { LEVELS, type ClearanceKind, type Level } from '../core/codes';
import { ACTIVITIES } from './activities/activities';
import type { Verdict } from './finding';
import type { Assessment } from './forms';
import { exact, plain } from './numbers';
import { readyToWalk, type WalkingChecks } from './readiness';
import { lackingClearance } from './rules/clearances';

/** The rise of the systolic pressure above rest that progress is made on, mmHg, both ends included. */
export const PROGRESS_SYSTOLIC_RISE = { from: 10, to: 40 } as const;

export const SUGGESTIONS = ['progress', 'stay', 'step-back'] as const;
export type Suggestion = (typeof SUGGESTIONS)[number];

export interface ProgressReason {
	/** `consider` is said and weighs nothing by itself. */
	readonly weight: 'for' | 'against' | 'consider';
	readonly words: string;
}

export interface Advice {
	readonly suggestion: Suggestion;
	/** The level the suggestion leads to; the same where it is to stay. */
	readonly to: Level;
	readonly reasons: readonly ProgressReason[];
	/** Clearances that activities of the next level need and this patient lacks. */
	readonly needs: readonly ClearanceKind[];
}

/** How the session stands to the level that is advised on. */
export interface Basis {
	/** The level that was treated at. */
	readonly sessionLevel: Level;
	/** Somebody has decided on the level since. */
	readonly decidedSince: boolean;
}

const NOTHING_SAID: WalkingChecks = { chestPain: null, heartFailureSigns: null, newRhythm: null };

/**
 * Advise on the level of a patient from their last session.
 * @param walking what is on record of the hours before; asked about where the next level is the first with walking
 * @param basis where the session was not one of today's level: an easier one, or one from before a decision, cannot
 *   speak for going on
 */
export function adviseLevel(
	level: Level,
	session: Assessment,
	verdict: Verdict,
	walking: WalkingChecks = NOTHING_SAID,
	basis?: Basis
): Advice {
	const up = shifted(level, 1);
	const reasons = [
		...basisReasons(level, basis),
		...findingReasons(verdict),
		...pressureReasons(session),
		...(isFirstWithWalking(up) ? walkingReasons(walking) : [])
	];
	const suggestion = suggest(verdict, reasons);
	const to = suggestion === 'progress' ? up : suggestion === 'step-back' ? shifted(level, -1) : level;
	return { suggestion, to, reasons, needs: up === level ? [] : clearancesLacking(session, up) };
}

/** The levels of a patient: what was reached stays on record, for today's level can fall. */
export interface Levels {
	readonly reached: Level;
	readonly today: Level;
}

/** The levels after somebody decided on `to`. */
export function afterDecision({ reached }: Levels, to: Level): Levels {
	return { reached: reached >= to ? reached : to, today: to };
}

function suggest({ outcome, findings }: Verdict, reasons: readonly ProgressReason[]): Suggestion {
	if (findings.some(({ grade, reading }) => grade === 'stop' && reading !== 'before')) {
		return 'step-back';
	}
	const held = outcome !== 'clear' || reasons.some(({ weight }) => weight === 'against');
	return held ? 'stay' : 'progress';
}

function basisReasons(level: Level, basis: Basis | undefined): ProgressReason[] {
	if (basis === undefined) {
		return [];
	}
	const easier = `It was a session of level ${basis.sessionLevel}; nothing is on record yet of level ${level}.`;
	const older = 'The level was decided on after it; no session is on record since.';
	return [
		...(basis.sessionLevel < level ? [{ weight: 'against' as const, words: easier }] : []),
		...(basis.decidedSince ? [{ weight: 'against' as const, words: older }] : [])
	];
}

function findingReasons({ findings, notJudged }: Verdict): ProgressReason[] {
	const against = findings
		.filter(({ grade, rule }) => grade !== 'note' || rule === 'reading-missing')
		.map(({ reason }): ProgressReason => ({ weight: 'against', words: reason }));
	const caveats = findings
		.filter(({ grade, rule }) => grade === 'note' && rule !== 'reading-missing')
		.map(({ reason }): ProgressReason => ({ weight: 'consider', words: reason }));
	const open = notJudged.filter((rule) => findings.every((finding) => finding.rule !== rule)).length;
	const unjudged: ProgressReason[] =
		open === 0
			? []
			: [
					{
						weight: 'consider',
						words: `Rules that could not be judged, for want of a reading, a posture or an answer: ${open}.`
					}
				];
	// A session in which nothing was compared with rest is quiet because nobody could hear.
	const uncompared: ProgressReason[] = notJudged.includes('systolic-fall')
		? [
				{
					weight: 'against',
					words: 'The pressure in effort or after it was not compared with one at rest in the same posture.'
				}
			]
		: [];
	const quiet: ProgressReason[] =
		against.length + uncompared.length === 0
			? [{ weight: 'for', words: 'No rule had a stop or a caution in this session.' }]
			: [];
	return [...quiet, ...against, ...uncompared, ...caveats, ...unjudged];
}

function pressureReasons({ before, during, after }: Assessment): ProgressReason[] {
	const rest = before.sbp;
	const peaks = [...during, after].map(({ sbp }) => sbp).filter((sbp) => sbp != null);
	if (rest == null || peaks.length === 0) {
		return [];
	}
	const rise = exact(Math.max(...peaks) - rest);
	const { from, to } = PROGRESS_SYSTOLIC_RISE;
	const course =
		rise > 0
			? `The systolic pressure rose by ${plain(rise)} mmHg at most`
			: 'The systolic pressure did not rise';
	if (rise > to) {
		return [{ weight: 'against', words: `${course}; more than ${to} holds the level.` }];
	}
	if (rise < from) {
		return [
			{
				weight: 'consider',
				words: `${course}; ${from} to ${to} is usual when the work is enough to show it.`
			}
		];
	}
	return [{ weight: 'for', words: `${course}, within the usual ${from} to ${to}.` }];
}

function walkingReasons(checks: WalkingChecks): ProgressReason[] {
	const { against, open } = readyToWalk(checks);
	return [
		...against.map((words): ProgressReason => ({ weight: 'against', words })),
		...open.map((words): ProgressReason => ({ weight: 'consider', words }))
	];
}

/** True for the level at which a patient first walks. */
function isFirstWithWalking(level: Level): boolean {
	const levels = ACTIVITIES.filter(({ walking, phase }) => walking && phase === 'inpatient').map(
		(activity) => activity.level
	);
	return level === Math.min(...levels);
}

function clearancesLacking({ context }: Assessment, level: Level): ClearanceKind[] {
	const ofLevel = ACTIVITIES.filter((activity) => activity.level === level && activity.phase === 'inpatient');
	const lacking = ofLevel
		.map((activity) => lackingClearance(context, activity))
		.filter((kind) => kind !== null);
	return [...new Set(lacking)];
}

function shifted(level: Level, by: 1 | -1): Level {
	return LEVELS.find((candidate) => candidate === level + by) ?? level;
}
