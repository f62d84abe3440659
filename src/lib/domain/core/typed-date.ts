import { isLocalDate, isLocalTime, type LocalDate, type LocalTime } from './time';

/** A day as people here write it, day before month: `5 9 1958`, `05/09/1958`, `5.9.1958`; or `1958-09-05`. */
const DAY_FIRST = /^(\d{1,2})[\s./-]+(\d{1,2})[\s./-]+(\d{4})$/;

/** The day that was typed, or null when it is none; a year has four digits, because patients are older than the century. */
export function readDate(typed: string): LocalDate | null {
	const text = typed.trim();
	const [, day = '', month = '', year = ''] = DAY_FIRST.exec(text) ?? [];
	const date = year === '' ? text : `${year}-${month.padStart(2, '0')}-${day.padStart(2, '0')}`;
	return isLocalDate(date) ? date : null;
}

/** A time of the 24 h clock as people here write it: `9:30`, `09.30`, `9 30`, `0930`, `930`; `9` is 09:00. */
const CLOCK = /^(\d{1,2})(?:\s*[:.h]\s*|\s+)?(\d{2})?$/i;

/** The time that was typed, or null when it is none. */
export function readTime(typed: string): LocalTime | null {
	const [, hours = '-', minutes = '00'] = CLOCK.exec(typed.trim()) ?? [];
	const time = `${hours.padStart(2, '0')}:${minutes}`;
	return isLocalTime(time) ? time : null;
}
