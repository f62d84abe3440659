/**
 * When a patient is reminded of a visit, and whether a reminder that is due may still go.
 *
 * The wanted times are calendar days in the hospital's zone. The hours in which a message may arrive are those
 * of the patient's zone: a time outside them is shifted to the nearest allowed one. Common practice, no
 * published source; the rule that messages keep to daytime follows the United States' limits on calls.
 */
import { allowedAround, isWithinHours, nextWithinHours } from '../core/hours';
import type { Hours } from '../core/hours';
import { addDays, instantOf, localDateOf } from '../core/time';
import type { Instant, LocalTime, Zone } from '../core/time';
import type { VisitState } from '../core/codes';
import { isExpected } from './states';

/** The hours of a patient's day in which a reminder may arrive; the end is excluded. */
export const REMINDER_HOURS: Hours = { from: '08:00', to: '20:00' };
/** The wall time in the hospital at which reminders are wanted. */
export const REMINDER_TIME: LocalTime = '17:00';

export const REMINDER_KINDS = ['two-days-before', 'day-before'] as const;
export type ReminderKind = (typeof REMINDER_KINDS)[number];

export interface PlannedReminder {
	readonly kind: ReminderKind;
	readonly dueAt: Instant;
	/** From here on it is of no use: the next reminder is due, or the visit begins. */
	readonly expiresAt: Instant;
}

export interface RemindedVisit {
	readonly startsAt: Instant;
	/** Whether the visit belongs to a series: its patients know the way and are asked once. */
	readonly inSeries: boolean;
}

export interface ReminderContext {
	/** The hospital's zone, in which 'the day before' is counted. */
	readonly zone: Zone;
	readonly patientZone: Zone;
	readonly now: Instant;
}

const DAYS_BEFORE: Record<ReminderKind, number> = { 'two-days-before': 2, 'day-before': 1 };

/**
 * The reminders of a visit, in order: the day before at 17:00 for one of a series, two days and one day before
 * for a single visit. Left out is only what would be in the past or not before the start.
 */
export function planReminders(visit: RemindedVisit, context: ReminderContext): PlannedReminder[] {
	const kinds = visit.inSeries ? REMINDER_KINDS.slice(1) : REMINDER_KINDS;
	const due = kinds.flatMap((kind) => {
		const dueAt = dueTime(kind, visit.startsAt, context);
		return dueAt === null ? [] : [{ kind, dueAt }];
	});
	const distinct = due.filter(({ dueAt }, index) => due[index + 1]?.dueAt !== dueAt);
	return distinct.map((reminder, index) => ({
		...reminder,
		expiresAt: distinct[index + 1]?.dueAt ?? visit.startsAt
	}));
}

/** The allowed time nearest to the wanted one that is neither past nor too late; null when there is none. */
function dueTime(kind: ReminderKind, startsAt: Instant, context: ReminderContext): Instant | null {
	const { zone, patientZone, now } = context;
	const date = addDays(localDateOf(startsAt, zone), -DAYS_BEFORE[kind]);
	const wanted = instantOf(date, REMINDER_TIME, zone);
	const { before, after } = allowedAround(wanted, patientZone, REMINDER_HOURS);
	const nearestFirst = wanted - before <= after - wanted ? [before, after] : [after, before];
	return nearestFirst.find((at) => at >= now && at < startsAt) ?? null;
}

/** What is known at the moment of sending, read again from the tables. */
export interface ReminderFacts {
	readonly state: VisitState;
	readonly startsAt: Instant;
	/** False once the visit has another time or place than the reminder tells. */
	readonly upToDate: boolean;
	readonly expiresAt: Instant;
	readonly hasPhone: boolean;
	readonly consented: boolean;
	readonly optedOut: boolean;
	readonly patientZone: Zone;
}

/** Why a reminder is not sent. The words stand in the message log. */
export type SkipReason =
	| 'visit is over or cancelled'
	| 'visit has moved'
	| 'too late'
	| 'no telephone number'
	| 'no consent'
	| 'opted out';

export type ReminderVerdict =
	| { readonly kind: 'send' }
	| { readonly kind: 'wait'; readonly until: Instant }
	| { readonly kind: 'skip'; readonly reason: SkipReason };

/** Whether a reminder that is due goes out now, waits for the patient's morning, or is skipped and why. */
export function judgeReminder(facts: ReminderFacts, now: Instant): ReminderVerdict {
	const reason = skipReason(facts, now);
	if (reason !== null) {
		return { kind: 'skip', reason };
	}
	if (isWithinHours(now, facts.patientZone, REMINDER_HOURS)) {
		return { kind: 'send' };
	}
	const until = nextWithinHours(now, facts.patientZone, REMINDER_HOURS);
	return until < Math.min(facts.expiresAt, facts.startsAt)
		? { kind: 'wait', until }
		: { kind: 'skip', reason: 'too late' };
}

function skipReason(facts: ReminderFacts, now: Instant): SkipReason | null {
	if (!isExpected(facts.state)) {
		return 'visit is over or cancelled';
	}
	if (!facts.upToDate) {
		return 'visit has moved';
	}
	if (now >= facts.startsAt || now >= facts.expiresAt) {
		return 'too late';
	}
	if (!facts.hasPhone) {
		return 'no telephone number';
	}
	if (facts.optedOut) {
		return 'opted out';
	}
	return facts.consented ? null : 'no consent';
}
