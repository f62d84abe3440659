/**
 * Instants, local dates and local times, and the way between them.
 *
 * An instant is a whole number of milliseconds UTC. What people agree on (a visit at 10:00, a reminder at
 * 17:00) is wall time in a zone, and becomes an instant here and nowhere else:
 * - a wall time that the clock skips becomes the first valid minute after the gap;
 * - a wall time that happens twice is the first of the two.
 * `instant.ts` reads and writes the RFC 3339 text of an instant, `hours.ts` keeps instants within hours of the
 * day. This folder alone knows the date library.
 */
import { fromAbsolute, getDayOfWeek, parseDate, parseDateTime, toZoned } from '@internationalized/date';
import type { CalendarDate } from '@internationalized/date';

/** Milliseconds UTC since 1970-01-01, a whole number. */
export type Instant = number;
/** `YYYY-MM-DD`, a day in somebody's calendar. */
export type LocalDate = string;
/** `HH:MM` on a 24 h clock. */
export type LocalTime = string;
/** A name of the IANA time zone database, such as `Europe/Dublin`. */
export type Zone = string;

export const SECOND = 1000;
export const MINUTE = 60 * SECOND;
export const HOUR = 60 * MINUTE;

/** Monday first. The codes are those of the JSON API. */
export const WEEKDAYS = ['mon', 'tue', 'wed', 'thu', 'fri', 'sat', 'sun'] as const;
export type Weekday = (typeof WEEKDAYS)[number];

/** An instant as a clock on a wall of the zone shows it. `offsetMinutes` is east of UTC. */
export interface LocalParts {
	readonly date: LocalDate;
	readonly time: LocalTime;
	readonly second: number;
	readonly weekday: Weekday;
	readonly offsetMinutes: number;
}

/** A date, time, zone or instant that is none. The message names the value and what was wanted. */
export class TimeError extends RangeError {
	override readonly name = 'TimeError';
}

/** Whether the text is a day that exists, written `YYYY-MM-DD`: `2025-02-29` is not. */
export function isLocalDate(value: string): boolean {
	if (!/^\d{4}-\d{2}-\d{2}$/.test(value)) {
		return false;
	}
	try {
		return parseDate(value).toString() === value;
	} catch {
		return false;
	}
}

/** Whether the text is a time from `00:00` to `23:59`. */
export function isLocalTime(value: string): boolean {
	return /^([01]\d|2[0-3]):[0-5]\d$/.test(value);
}

/** Whether this machine's zone data knows the name. Bare offsets such as `+01:00` are no zones. */
export function isZone(value: string): boolean {
	if (!/^[A-Za-z]/.test(value)) {
		return false;
	}
	try {
		return new Intl.DateTimeFormat('en', { timeZone: value }).resolvedOptions().timeZone !== '';
	} catch {
		return false;
	}
}

/** The instant of a wall time in a zone. Throws a TimeError when date, time or zone is none. */
export function instantOf(date: LocalDate, time: LocalTime, zone: Zone): Instant {
	requireDate(date);
	if (!isLocalTime(time)) {
		throw new TimeError(`'${time}' is not a time of day: write HH:MM from 00:00 to 23:59.`);
	}
	requireZone(zone);
	const wall = parseDateTime(`${date}T${time}`);
	const first = toZoned(wall, zone, 'earlier').toDate().getTime();
	const last = toZoned(wall, zone, 'later').toDate().getTime();
	return showsWallTime(first, date, time, zone) ? first : endOfGap(first, last, zone);
}

/** What clock and calendar of the zone show at the instant. Throws a TimeError for no instant or no zone. */
export function localParts(at: Instant, zone: Zone): LocalParts {
	if (!Number.isInteger(at)) {
		throw new TimeError(`${at} is not an instant: it must be whole milliseconds UTC.`);
	}
	requireZone(zone);
	const zoned = fromAbsolute(at, zone);
	const wall = zoned.toString();
	return {
		date: wall.slice(0, 10),
		time: wall.slice(11, 16),
		second: zoned.second,
		weekday: weekdayOf(wall.slice(0, 10)),
		offsetMinutes: zoned.offset / MINUTE
	};
}

/** So many days are remembered at once; a page of sixty patients asks for some two hundred. */
const DAYS_KEPT = 500;
const knownDays = new Map<string, LocalDate>();

/** The local day that holds the instant. Of now it is asked for each fact of each patient, and finding it is slow. */
export function localDateOf(at: Instant, zone: Zone): LocalDate {
	const asked = `${at} ${zone}`;
	const known = knownDays.get(asked);
	if (known !== undefined) {
		return known;
	}
	const { date } = localParts(at, zone);
	if (knownDays.size >= DAYS_KEPT) {
		knownDays.clear();
	}
	knownDays.set(asked, date);
	return date;
}

/** The wall time of the instant, seconds cut off. */
export function localTimeOf(at: Instant, zone: Zone): LocalTime {
	return localParts(at, zone).time;
}

/** The day so many days later; earlier when negative. Days of a calendar, never hours. */
export function addDays(date: LocalDate, days: number): LocalDate {
	if (!Number.isInteger(days)) {
		throw new TimeError(`${days} is not a number of days: it must be whole.`);
	}
	const from = requireDate(date);
	const sum = from.add({ days }).toString();
	// At either end of its calendar the library stops counting without a word.
	if (!isLocalDate(sum) || parseDate(sum).compare(from) !== days) {
		throw new TimeError(`${date} and ${days} days leave the years 0001 to 9999.`);
	}
	return sum;
}

/** Days from one date to the other: 0 on the same day, negative when `to` is earlier. */
export function daysBetween(from: LocalDate, to: LocalDate): number {
	return requireDate(to).compare(requireDate(from));
}

/** The weekday of a date. */
export function weekdayOf(date: LocalDate): Weekday {
	const index = getDayOfWeek(requireDate(date), 'en', 'mon');
	const weekday = WEEKDAYS[index];
	if (weekday === undefined) {
		throw new TimeError(`${date} has no weekday.`);
	}
	return weekday;
}

/** Whether the clock of the zone is set forward or back within this day: screens then show the offset. */
export function hasClockChange(date: LocalDate, zone: Zone): boolean {
	const start = instantOf(date, '00:00', zone);
	const end = instantOf(addDays(date, 1), '00:00', zone);
	return localParts(start, zone).offsetMinutes !== localParts(end, zone).offsetMinutes;
}

function requireDate(date: LocalDate): CalendarDate {
	if (!isLocalDate(date)) {
		throw new TimeError(`'${date}' is not a date: write a day that exists as YYYY-MM-DD.`);
	}
	return parseDate(date);
}

const knownZones = new Set<Zone>();

/** Asking the platform is slow, and the same few zones are asked for again and again. */
function requireZone(zone: Zone): void {
	if (knownZones.has(zone)) {
		return;
	}
	if (!isZone(zone)) {
		throw new TimeError(`'${zone}' is not a time zone: write an IANA name such as Europe/Dublin.`);
	}
	knownZones.add(zone);
}

function showsWallTime(at: Instant, date: LocalDate, time: LocalTime, zone: Zone): boolean {
	const wall = fromAbsolute(at, zone).toString();
	return wall.slice(0, 10) === date && wall.slice(11, 16) === time;
}

/**
 * The minute at which the clock jumps, between an instant before it and one at or after it. The library would
 * carry 02:30 over a gap of an hour to 03:30; a visit in the gap is better begun at once, at 03:00.
 */
function endOfGap(before: Instant, after: Instant, zone: Zone): Instant {
	const offset = fromAbsolute(before, zone).offset;
	let low = before;
	let high = after;
	while (high - low > MINUTE) {
		const middle = low + Math.floor((high - low) / MINUTE / 2) * MINUTE;
		if (fromAbsolute(middle, zone).offset === offset) {
			low = middle;
		} else {
			high = middle;
		}
	}
	return high;
}
