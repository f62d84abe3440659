import type { VisitState } from '../core/codes';
import type { PatientLine } from '../episodes/views';
import type { ReachProblem } from '../messages/reach';

/** What became of one reminder; `state` and `reason` are those of its message. */
export interface ReminderFate {
	/** When it was meant to go, RFC 3339. */
	dueAt: string;
	/** `ready` waits, `accepted` left the house, `delivered` arrived; the others did not go, and `reason` says why. */
	state: string;
	reason: string | null;
	sentAt: string | null;
}

/** A day on which the hospital receives no visits. */
export interface ClosedDay {
	id: string;
	/** `YYYY-MM-DD`. */
	date: string;
	name: string;
	/** How many visits stand on it all the same: each of them has to be moved. */
	visits: number;
}

/** Why no reminder of a visit goes: it was booked or moved after the hour of the last one, or nobody can be written to. */
export type NoReminder = ReachProblem | 'too-late-for-one';

/** A change of a visit that its patient has not heard of: whom to call, and what to say. */
export interface UntoldVisitView {
	id: string;
	body: string;
	to: { name: string; phone: string | null };
	patient: PatientLine;
	episodeId: string;
	/** When it was cancelled or moved, RFC 3339. */
	changedAt: string;
	settled: boolean;
}

/** What the patient answered to a reminder, and when (RFC 3339). */
export interface PatientAnswer {
	at: string;
	yes: boolean;
}

/** One visit of the week, for those who plan and receive it. Instants are RFC 3339. */
export interface VisitItem {
	id: string;
	episodeId: string;
	patient: PatientLine;
	startsAt: string;
	minutes: number;
	/** The unit where it takes place. */
	place: string;
	unitId: string;
	state: VisitState;
	reason: string | null;
	/** What the closed day is called that it stands on while it is expected; null on an open one. */
	closedDay: string | null;
	/** Cancelled by the patient, and nobody has followed it up yet. */
	wantsFollowUp: boolean;
	/** Grows with each move; see the calendar file. */
	sequence: number;
	/** Why no reminder goes; null when one goes or has gone. */
	noReminder: NoReminder | null;
	/** The same for all visits that were booked together. */
	seriesId: string | null;
	reminders: ReminderFate[];
	/** The last yes or no by text; null while there is none. */
	answer: PatientAnswer | null;
}
