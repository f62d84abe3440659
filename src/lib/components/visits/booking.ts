/** A booking while it is typed: what it would make, what is wrong with it, and the body that asks for it. */
import { COUNT_MAX, DAYS_AHEAD_MAX, MINUTES_MAX, MINUTES_MIN } from '$lib/domain/visits/limits';
import { toRfc3339 } from '$lib/domain/core/instant';
import {
	addDays,
	isLocalDate,
	isLocalTime,
	localDateOf,
	localParts,
	type LocalDate,
	type Weekday,
	type Zone
} from '$lib/domain/core/time';
import { readDate, readTime } from '$lib/domain/core/typed-date';
import { readNumber, type TypedNumber } from '$lib/domain/core/typed-number';
import { planReminders } from '$lib/domain/visits/reminders';
import { planSeries, skippedDays, type PlannedVisit } from '$lib/domain/visits/series';
import type { VisitItem } from '$lib/domain/visits/views';
import { day, dayToType } from '$lib/format';
import { m } from '$lib/i18n/paraglide/messages';

/**
 * What the fields hold, days, times and numbers as they were typed; `date` is the day of a single visit, or the day
 * from which a series counts.
 */
export interface BookingDraft {
	kind: 'single' | 'series';
	date: string;
	time: string;
	minutes: string;
	/** Identifier of the unit. */
	place: string;
	weekdays: Weekday[];
	count: string;
}

export type BookingProblems = Partial<Record<keyof BookingDraft, string>>;

export interface BookingPlan {
	/** The visits it would make, in order; empty while they cannot be told. */
	planned: PlannedVisit[];
	/** Closed days that a series steps over. */
	skipped: LocalDate[];
	/** How many of them no reminder can be sent of any more, for a patient who lives where the hospital is. */
	withoutReminder: number;
	problems: BookingProblems;
	/** What to post; null while something is wrong. */
	body: Record<string, unknown> | null;
}

export function emptyDraft(place: string): BookingDraft {
	return { kind: 'single', date: '', time: '', minutes: '60', place, weekdays: [], count: '12' };
}

/** Work a draft out in the hospital's wall time, as the server will. */
export function planOf(
	typed: BookingDraft,
	zone: Zone,
	now: number,
	closed: ReadonlySet<LocalDate> = new Set()
): BookingPlan {
	const draft = readDraft(typed);
	const problems = fieldProblems(draft, typed);
	const datable = !(['date', 'time', 'weekdays', 'count'] as const).some((field) => problems[field]);
	const planned = datable ? plannedOf(draft, zone, closed) : [];
	const outside = rangeProblem(planned, zone, now) ?? closedProblem(draft, closed);
	const all = outside ? { ...problems, ...outside } : problems;
	// What cannot be booked is not shown as if it could.
	return {
		planned: outside ? [] : planned,
		skipped: outside || !datable ? [] : skippedOf(draft, planned, closed),
		withoutReminder: outside ? 0 : withoutReminder(draft, planned, zone, now),
		problems: all,
		body: Object.keys(all).length > 0 ? null : bodyOf(draft, planned)
	};
}

/** A visit as a draft, for giving it another time. */
export function draftOf(
	{ startsAt, minutes, unitId }: Pick<VisitItem, 'startsAt' | 'minutes' | 'unitId'>,
	zone: Zone
): BookingDraft {
	const { date, time } = localParts(Date.parse(startsAt), zone);
	return { ...emptyDraft(unitId), date: dayToType(date), time, minutes: String(minutes) };
}

function plannedOf(draft: ReadDraft, zone: Zone, closed: ReadonlySet<LocalDate>): PlannedVisit[] {
	// A single visit is on the day that was asked for or not at all.
	return planSeries(seriesOf(draft), zone, draft.kind === 'series' ? closed : undefined);
}

function skippedOf(draft: ReadDraft, planned: readonly PlannedVisit[], closed: ReadonlySet<LocalDate>) {
	return draft.kind === 'series' ? skippedDays(seriesOf(draft), planned, closed) : [];
}

function closedProblem({ kind, date }: ReadDraft, closed: ReadonlySet<LocalDate>): BookingProblems | null {
	return kind === 'single' && closed.has(date) ? { date: m.visits_problem_closed({ day: day(date) }) } : null;
}

function withoutReminder(
	{ kind }: ReadDraft,
	planned: readonly PlannedVisit[],
	zone: Zone,
	now: number
): number {
	const inSeries = kind === 'series';
	const context = { zone, patientZone: zone, now };
	return planned.filter(({ startsAt }) => planReminders({ startsAt, inSeries }, context).length === 0).length;
}

/** The days a visit is booked for most often: the three after today. */
export function nextDays(now: number, zone: Zone): LocalDate[] {
	return [1, 2, 3].map((days) => addDays(localDateOf(now, zone), days));
}

/** A draft whose fields are read. */
interface ReadDraft extends Omit<BookingDraft, 'minutes' | 'count'> {
	minutes: TypedNumber;
	count: TypedNumber;
}

/** The draft with its fields read; a day or time that is none stays as it was typed, and is named in what is wrong. */
function readDraft(draft: BookingDraft): ReadDraft {
	const { date, time, minutes, count } = draft;
	const numbers = { minutes: readNumber(minutes), count: readNumber(count) };
	return { ...draft, ...numbers, date: readDate(date) ?? date, time: readTime(time) ?? time };
}

const orNought = (read: TypedNumber): number => (read.kind === 'number' ? read.value : 0);

/** The field that an error of the server is about. */
export function bookingField(pointer: string): keyof BookingDraft {
	const field = pointer.split('/').at(-1) ?? '';
	const known = ['time', 'minutes', 'place', 'weekdays', 'count'] as const;
	return known.find((name) => name === field) ?? 'date';
}

function seriesOf({ kind, date, time, minutes, weekdays, count }: ReadDraft) {
	const single = { from: date, weekdays: EVERY_DAY, count: 1 };
	const series = { from: date, weekdays, count: orNought(count) };
	return { ...(kind === 'single' ? single : series), time, minutes: orNought(minutes) };
}

const EVERY_DAY = ['mon', 'tue', 'wed', 'thu', 'fri', 'sat', 'sun'] as const;

function fieldProblems(draft: ReadDraft, typed: BookingDraft): BookingProblems {
	const series = draft.kind === 'series';
	const checks: [keyof BookingDraft, boolean, () => string][] = [
		['date', isLocalDate(draft.date), () => wrongDay(draft.date)],
		['time', isLocalTime(draft.time), () => wrongTime(draft.time)],
		['minutes', isWhole(draft.minutes, MINUTES_MIN, MINUTES_MAX), () => wrongMinutes(typed.minutes.trim())],
		['place', draft.place !== '', m.visits_problem_place],
		['weekdays', !series || draft.weekdays.length > 0, m.visits_problem_weekdays],
		['count', !series || isWhole(draft.count, 1, COUNT_MAX), () => wrongCount(typed.count.trim())]
	];
	return Object.fromEntries(checks.flatMap(([field, right, words]) => (right ? [] : [[field, words()]])));
}

function wrongDay(typed: string): string {
	return typed.trim() ? m.visits_problem_date({ typed }) : m.visits_problem_no_date();
}

function wrongTime(typed: string): string {
	return typed.trim() ? m.visits_problem_time({ typed }) : m.visits_problem_no_time();
}

function wrongMinutes(typed: string): string {
	const bounds = { min: MINUTES_MIN, max: MINUTES_MAX };
	return typed ? m.visits_problem_minutes({ typed, ...bounds }) : m.visits_problem_no_minutes(bounds);
}

function wrongCount(typed: string): string {
	const max = COUNT_MAX;
	return typed ? m.visits_problem_count({ typed, max }) : m.visits_problem_no_count({ max });
}

function isWhole(read: TypedNumber, min: number, max: number): boolean {
	return read.kind === 'number' && Number.isInteger(read.value) && read.value >= min && read.value <= max;
}

function rangeProblem(planned: readonly PlannedVisit[], zone: Zone, now: number): BookingProblems | null {
	const [first] = planned;
	const last = planned.at(-1);
	if (!first || !last) {
		return null;
	}
	if (first.startsAt < now) {
		return { date: m.visits_problem_past() };
	}
	const latest = addDays(localDateOf(now, zone), DAYS_AHEAD_MAX);
	return last.localDate > latest ? { date: m.visits_problem_far({ day: day(latest) }) } : null;
}

function bodyOf(draft: ReadDraft, planned: readonly PlannedVisit[]): Record<string, unknown> | null {
	const [first] = planned;
	const { kind, date, weekdays, time, place } = draft;
	const [minutes, count] = [orNought(draft.minutes), orNought(draft.count)];
	if (!first) {
		return null;
	}
	return kind === 'single'
		? { startsAt: toRfc3339(first.startsAt), minutes, place }
		: { series: { from: date, weekdays, time, count, minutes, place } };
}
