import { isLocalDate, type LocalDate } from './time';

/** A day as people here write it, day before month: `5 9 1958`, `05/09/1958`, `5.9.1958`; or `1958-09-05`. */
const DAY_FIRST = /^(\d{1,2})[\s./-]+(\d{1,2})[\s./-]+(\d{4})$/;

/** The day that was typed, or null when it is none; a year has four digits, because patients are older than the century. */
export function readDate(typed: string): LocalDate | null {
	const text = typed.trim();
	const [, day = '', month = '', year = ''] = DAY_FIRST.exec(text) ?? [];
	const date = year === '' ? text : `${year}-${month.padStart(2, '0')}-${day.padStart(2, '0')}`;
	return isLocalDate(date) ? date : null;
}
