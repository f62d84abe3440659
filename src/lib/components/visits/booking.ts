/** A booking while it is typed: what it would make, why that cannot be, and the body that asks for it. */
import { COUNT_MAX, DAYS_AHEAD_MAX } from '$lib/domain/visits/limits';
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

export interface BookingPlan {
	/** The visits it would make, in order; empty while they cannot be told. */
	planned: PlannedVisit[];
	/** Closed days that a series steps over. */
	skipped: LocalDate[];
	/** How many of them no reminder can be sent of any more, for a patient who lives where the hospital is. */
	withoutReminder: number;
	/** Why these days cannot be booked, although each field may be right by itself. */
	refused: string | null;
	/** What to post. What is no day or time stands in it as it was typed: the server names it. */
	body: Record<string, unknown>;
}

export function emptyDraft(place: string): BookingDraft {
	return { kind: 'single', date: '', time: '', minutes: '60', place, weekdays: [], count: '12' };
}

type TypedBooking = Omit<BookingDraft, 'kind' | 'date' | 'weekdays' | 'count'> &
	Partial<Pick<BookingDraft, 'date' | 'weekdays' | 'count'> & { from: string }>;

/** The fields that such a booking has, by the names of its form, as they were typed. */
export function typedOf({ kind, date, weekdays, count, ...each }: BookingDraft): TypedBooking {
	return kind === 'single' ? { date, ...each } : { from: date, weekdays, count, ...each };
}

/** Work a draft out in the hospital's wall time, as the server will. */
export function planOf(
	typed: BookingDraft,
	zone: Zone,
	now: number,
	closed: ReadonlySet<LocalDate> = new Set()
): BookingPlan {
	const draft = readDraft(typed);
	const planned = isDatable(draft) ? plannedOf(draft, zone, closed) : [];
	const refused = rangeProblem(planned, zone, now) ?? closedProblem(draft, closed);
	// What cannot be booked is not shown as if it could.
	const shown = refused === null ? planned : [];
	return {
		planned: shown,
		skipped: shown.length > 0 ? skippedOf(draft, planned, closed) : [],
		withoutReminder: withoutReminder(draft, shown, zone, now),
		refused,
		body: bodyOf(draft, planned)
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

function closedProblem({ kind, date }: ReadDraft, closed: ReadonlySet<LocalDate>): string | null {
	return kind === 'single' && closed.has(date) ? m.visits_problem_closed({ day: day(date) }) : null;
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

/** The field of the form that an error of the server is about. */
export function bookingField(pointer: string): string {
	const field = pointer.split('/').find((part) => part !== 'series') ?? '';
	return field === 'startsAt' ? 'date' : field;
}

/** A refusal of the server by the fields of the form. */
export function bookingRefusal<T extends { fields?: Record<string, string> }>(problem: T | null): T | null {
	const fields = Object.entries(problem?.fields ?? {}).map(([at, message]) => [bookingField(at), message]);
	return problem && { ...problem, fields: Object.fromEntries(fields) as Record<string, string> };
}

function seriesOf({ kind, date, time, minutes, weekdays, count }: ReadDraft) {
	const single = { from: date, weekdays: EVERY_DAY, count: 1 };
	const series = { from: date, weekdays, count: orNought(count) };
	return { ...(kind === 'single' ? single : series), time, minutes: orNought(minutes) };
}

const EVERY_DAY = ['mon', 'tue', 'wed', 'thu', 'fri', 'sat', 'sun'] as const;

/** Whether it is known which days it is about. */
function isDatable({ kind, date, time, weekdays, count }: ReadDraft): boolean {
	return (
		isLocalDate(date) && isLocalTime(time) && (kind === 'single' || (weekdays.length > 0 && isCount(count)))
	);
}

function isCount(read: TypedNumber): boolean {
	return read.kind === 'number' && Number.isInteger(read.value) && read.value >= 1 && read.value <= COUNT_MAX;
}

function rangeProblem(planned: readonly PlannedVisit[], zone: Zone, now: number): string | null {
	const [first] = planned;
	const last = planned.at(-1);
	if (!first || !last) {
		return null;
	}
	if (first.startsAt < now) {
		return m.visits_problem_past();
	}
	const latest = addDays(localDateOf(now, zone), DAYS_AHEAD_MAX);
	return last.localDate > latest ? m.visits_problem_far({ day: day(latest) }) : null;
}

function bodyOf(draft: ReadDraft, [first]: readonly PlannedVisit[]): Record<string, unknown> {
	const { kind, date, weekdays, time, place } = draft;
	const [minutes, count] = [orNought(draft.minutes), orNought(draft.count)];
	return kind === 'single'
		? { startsAt: first ? toRfc3339(first.startsAt) : `${date}T${time}`, minutes, place }
		: { series: { from: date, weekdays, time, count, minutes, place } };
}
