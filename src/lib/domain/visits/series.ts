/** Planning visits in wall time: what is agreed is the local time, and the instant follows from the zone. */
import { WEEKDAYS, addDays, instantOf, localParts, weekdayOf } from '../core/time';
import type { Instant, LocalDate, LocalTime, Weekday, Zone } from '../core/time';

/** A visit as it is stored: local wall time, zone and the derived instant. */
export interface PlannedVisit {
	readonly localDate: LocalDate;
	readonly localTime: LocalTime;
	readonly zone: Zone;
	readonly startsAt: Instant;
	readonly minutes: number;
}

/** So many visits on these weekdays, at this time, on or after `from`. */
export interface Series {
	readonly from: LocalDate;
	readonly weekdays: readonly Weekday[];
	readonly time: LocalTime;
	readonly count: number;
	readonly minutes: number;
}

/** One visit from its instant. */
export function planVisit(startsAt: Instant, minutes: number, zone: Zone): PlannedVisit {
	const { date, time } = localParts(startsAt, zone);
	return { localDate: date, localTime: time, zone, startsAt, minutes };
}

/** No day is closed. */
const NONE: ReadonlySet<LocalDate> = new Set();

/**
 * The visits of a series, in order, none of them on a closed day: the series grows longer by as many. Each keeps its time of day over a change of the clock; one that falls into
 * the skipped hour begins at the first minute after it. Throws a RangeError when no weekday is given.
 */
export function planSeries(
	series: Series,
	zone: Zone,
	closed: ReadonlySet<LocalDate> = NONE
): PlannedVisit[] {
	const { weekdays, time, count, minutes } = series;
	if (!weekdays.some((weekday) => WEEKDAYS.includes(weekday))) {
		throw new RangeError('A series needs at least one weekday.');
	}
	const visits: PlannedVisit[] = [];
	for (let date = series.from; visits.length < count; date = addDays(date, 1)) {
		if (weekdays.includes(weekdayOf(date)) && !closed.has(date)) {
			visits.push({
				localDate: date,
				localTime: time,
				zone,
				startsAt: instantOf(date, time, zone),
				minutes
			});
		}
	}
	return visits;
}

/** The closed days that a series stepped over, in order. */
export function skippedDays(
	series: Series,
	planned: readonly PlannedVisit[],
	closed: ReadonlySet<LocalDate>
): LocalDate[] {
	const last = planned.at(-1)?.localDate ?? series.from;
	return [...closed]
		.filter((date) => date >= series.from && date <= last && series.weekdays.includes(weekdayOf(date)))
		.sort();
}

/** The same visit after the zone's rules have changed: wall time stays, the instant is worked out anew. */
export function rederive<T extends PlannedVisit>(visit: T): T {
	return { ...visit, startsAt: instantOf(visit.localDate, visit.localTime, visit.zone) };
}
