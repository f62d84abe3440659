/** Keeping an instant within hours of the day, for messages that must not wake anybody. */
import { MINUTE, TimeError, addDays, instantOf, localDateOf } from './time';
import type { Instant, LocalDate, LocalTime, Zone } from './time';

/** Open from `from`, included, until `to`, excluded, on every local day. */
export interface Hours {
	readonly from: LocalTime;
	readonly to: LocalTime;
}

/** The allowed minutes on either side of an instant; both are the instant itself when it is allowed. */
export interface AllowedAround {
	readonly before: Instant;
	readonly after: Instant;
}

/** Whether the instant lies within the hours of its local day. */
export function isWithinHours(at: Instant, zone: Zone, hours: Hours): boolean {
	const { open, close } = hoursOf(localDateOf(at, zone), zone, hours);
	return at >= open && at < close;
}

/** The last allowed minute before the instant and the first one after it. */
export function allowedAround(at: Instant, zone: Zone, hours: Hours): AllowedAround {
	const date = localDateOf(at, zone);
	const { open, close } = hoursOf(date, zone, hours);
	if (at < open) {
		return { before: hoursOf(addDays(date, -1), zone, hours).close - MINUTE, after: open };
	}
	if (at >= close) {
		return { before: close - MINUTE, after: hoursOf(addDays(date, 1), zone, hours).open };
	}
	return { before: at, after: at };
}

/** The nearest allowed minute, in either direction; the earlier one when both are equally near. */
export function clampToHours(at: Instant, zone: Zone, from: LocalTime, to: LocalTime): Instant {
	const { before, after } = allowedAround(at, zone, { from, to });
	return at - before <= after - at ? before : after;
}

/** The instant itself when allowed, else the next opening: for what is about to be sent. */
export function nextWithinHours(at: Instant, zone: Zone, hours: Hours): Instant {
	return allowedAround(at, zone, hours).after;
}

function hoursOf(date: LocalDate, zone: Zone, { from, to }: Hours): { open: Instant; close: Instant } {
	if (from >= to) {
		throw new TimeError(`The hours ${from} to ${to} are empty: the start must be before the end.`);
	}
	return { open: instantOf(date, from, zone), close: instantOf(date, to, zone) };
}
