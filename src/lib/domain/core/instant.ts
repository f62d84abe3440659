/** Instants as text: RFC 3339, which is what the JSON API speaks. */
import { TimeError, isLocalDate } from './time';
import type { Instant } from './time';

const SHAPE = /^(\d{4}-\d{2}-\d{2})T(\d{2}:\d{2}:\d{2})(?:\.(\d+))?(Z|([+-])(\d{2}):(\d{2}))$/i;
const CLOCK = /^([01]\d|2[0-3]):[0-5]\d:[0-5]\d$/;

/** The first and the last instant whose year has four digits. */
const FIRST = Date.parse('0001-01-01T00:00:00.000Z');
const LAST = Date.parse('9999-12-31T23:59:59.999Z');

/** `2025-03-28T10:00:00.000Z`. Throws a TimeError outside the years 0001 to 9999 and for fractions. */
export function toRfc3339(at: Instant): string {
	if (!Number.isInteger(at) || at < FIRST || at > LAST) {
		throw new TimeError(`${at} is not an instant: it must be whole milliseconds UTC, years 0001 to 9999.`);
	}
	return new Date(at).toISOString();
}

/**
 * Read an RFC 3339 instant; digits after the millisecond are cut off. Throws a TimeError that names the value
 * for anything else: a missing offset, a day that does not exist, a leap second.
 */
export function parseRfc3339(text: string): Instant {
	const match = SHAPE.exec(text);
	if (!match) {
		throw refusal(text, 'write it like 2025-03-28T10:00:00Z, with Z or an offset');
	}
	const [, date = '', clock = '', fraction = '', , sign, hours = '0', minutes = '0'] = match;
	if (!isLocalDate(date)) {
		throw refusal(text, `there is no day ${date}`);
	}
	if (!CLOCK.test(clock)) {
		throw refusal(text, `there is no time ${clock}; it goes from 00:00:00 to 23:59:59`);
	}
	if (Number(hours) > 23 || Number(minutes) > 59) {
		throw refusal(text, `its offset ${hours}:${minutes} is over 23:59`);
	}
	const milliseconds = fraction.padEnd(3, '0').slice(0, 3);
	const offset = (Number(hours) * 60 + Number(minutes)) * 60_000 * (sign === '-' ? -1 : 1);
	return Date.parse(`${date}T${clock}.${milliseconds}Z`) - offset;
}

/** Whether `parseRfc3339` would accept the text. */
export function isRfc3339(text: string): boolean {
	try {
		parseRfc3339(text);
		return true;
	} catch {
		return false;
	}
}

function refusal(text: string, reason: string): TimeError {
	return new TimeError(`'${text}' is not an instant: ${reason}.`);
}
