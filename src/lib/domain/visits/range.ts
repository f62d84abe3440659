/** The stretch of time that a list of visits covers. */
import { isRfc3339, parseRfc3339 } from '../core/instant';
import { HOUR, WEEKDAYS, addDays, instantOf, isLocalDate, localDateOf, weekdayOf } from '../core/time';
import type { Instant, LocalDate, Zone } from '../core/time';

/** Two months are more than any page shows at once. */
export const RANGE_DAYS_MAX = 62;

/** From `from`, included, until `to`, excluded. */
export interface VisitRange {
	readonly from: Instant;
	readonly to: Instant;
}

/** A bound that cannot be used. `field` is `from` or `to`; the message names value and limit. */
export class RangeProblem extends Error {
	constructor(
		readonly field: 'from' | 'to',
		message: string
	) {
		super(message);
	}
}

/**
 * The range between two bounds, each a day in the hospital's calendar (both included) or an instant. A missing
 * `from` is the Monday of this week; a missing `to` is six days after `from`.
 * @throws RangeProblem
 */
export function visitRange(from: string | null, to: string | null, zone: Zone, now: Instant): VisitRange {
	const start = bound('from', from ?? mondayOf(localDateOf(now, zone)), zone, 0);
	const lastDay = addDays(localDateOf(start, zone), 7);
	const end = to === null ? instantOf(lastDay, '00:00', zone) : bound('to', to, zone, 1);
	if (end <= start) {
		throw new RangeProblem('to', `to is '${to}': it must be after from.`);
	}
	// A day on which the clock is set back has 25 hours.
	if (end - start > (RANGE_DAYS_MAX * 24 + 1) * HOUR) {
		throw new RangeProblem('to', `to is '${to}': it must be at most ${RANGE_DAYS_MAX} days after from.`);
	}
	return { from: start, to: end };
}

/** The Monday of the week that holds a day. */
export function mondayOf(date: LocalDate): LocalDate {
	return addDays(date, -WEEKDAYS.indexOf(weekdayOf(date)));
}

function bound(field: 'from' | 'to', value: string, zone: Zone, daysAfter: number): Instant {
	if (isLocalDate(value)) {
		return instantOf(addDays(value, daysAfter), '00:00', zone);
	}
	if (isRfc3339(value)) {
		return parseRfc3339(value);
	}
	const shown = value.slice(0, 40);
	throw new RangeProblem(field, `${field} is '${shown}': it must be a day as YYYY-MM-DD or an instant.`);
}
