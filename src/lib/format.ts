/**
 * Dates, times and durations as pages show them: weekday and month in words, a 24 h clock, no bare numbers for
 * months. Names of days and months come from Intl; English ones are cut to three letters here, because server
 * and browser do not agree on 'Sep' and 'Sept', and a page must read the same from both.
 */
import {
	HOUR,
	MINUTE,
	SECOND,
	daysBetween,
	hasClockChange,
	instantOf,
	localDateOf,
	localParts
} from './domain/core/time';
import { readDate, readTime } from './domain/core/typed-date';
import type { Instant, LocalDate, LocalParts, Zone } from './domain/core/time';
import { m } from './i18n/paraglide/messages';
import { baseLocale, locales, type Locale } from './i18n/paraglide/runtime';

/** Between two facts on one line; it stays with the first when the line breaks. */
export const DOT = '\u00a0· ';

export const DEFAULT_LOCALE = 'en-IE';

/** How days and numbers are written in a language of the pages. */
export function localeOf(language: Locale): string {
	return language === 'en' ? DEFAULT_LOCALE : language;
}

/** Where and when somebody reads: the zone of the hospital (or the patient), the instant of now, the language. */
export interface Reader {
	readonly zone: Zone;
	readonly now: Instant;
	readonly locale?: string;
}

type Length = 'short' | 'long';
type Field = 'weekday' | 'month';
const nameFormats = new Map<string, Intl.DateTimeFormat>();

/** `12:31`; on a day on which the clock changes with its offset, `01:30 (UTC+1)`, so that no hour is unclear. */
export function clock(at: Instant, zone: Zone): string {
	const { date, time, offsetMinutes } = localParts(at, zone);
	return mayChange(at, zone) && hasClockChange(date, zone) ? `${time} (${offset(offsetMinutes)})` : time;
}

/** `Thu 12:31` */
export function weekdayClock(at: Instant, { zone, locale }: Omit<Reader, 'now'>): string {
	return `${weekday(localDateOf(at, zone), 'short', locale)} ${clock(at, zone)}`;
}

/** `5 Sep 1958`, of a day in the calendar such as a birth date. */
export function day(date: LocalDate, locale: string = DEFAULT_LOCALE): string {
	return `${dayOfMonth(date)} ${month(date, 'short', locale)} ${date.slice(0, 4)}`;
}

/** `Thu 5 Sep`, with the year when it is not the reader's. */
export function shortDay(date: LocalDate, { zone, now, locale }: Reader): string {
	const words = `${weekday(date, 'short', locale)} ${dayOfMonth(date)} ${month(date, 'short', locale)}`;
	const sameYear = date.slice(0, 4) === localDateOf(now, zone).slice(0, 4);
	return sameYear ? words : `${words} ${date.slice(0, 4)}`;
}

/** `Thursday 5 September 2025`, in Spanish `jueves 5 de septiembre de 2025`, for headings and letters. */
export function longDay(date: LocalDate, locale: string = DEFAULT_LOCALE): string {
	const of = locale.startsWith('es') ? ' de ' : ' ';
	const named = [dayOfMonth(date), month(date, 'long', locale), date.slice(0, 4)].join(of);
	return `${weekday(date, 'long', locale)} ${named}`;
}

/** The day that was typed, in the words of `longDay`; null for what is no day. */
export function typedDay(typed: string, locale?: string): string | null {
	const date = readDate(typed);
	return date === null ? null : longDay(date, locale);
}

/** A day as it is typed, day before month: `5 9 1958`. */
export function dayToType(date: LocalDate): string {
	return [date.slice(8), date.slice(5, 7), date.slice(0, 4)].map(Number).join(' ');
}

/** The time that was typed, by the 24 h clock: `09:30` of `930`; null for what is no time. */
export function typedTime(typed: string): string | null {
	return readTime(typed);
}

/** `Thu 5 Sep 12:31`, with the year when it is not the reader's. */
export function dayAndClock(at: Instant, reader: Reader): string {
	return `${shortDay(localDateOf(at, reader.zone), reader)} ${clock(at, reader.zone)}`;
}

/**
 * As short as it is clear: `12:31` today, `yesterday 12:31`, `tomorrow 12:31`, `Thu 12:31` within six days,
 * `Thu 5 Sep 12:31` otherwise.
 */
export function when(at: Instant, reader: Reader): string {
	return daysFromToday(at, reader) === 0 ? clock(at, reader.zone) : namedWhen(at, reader);
}

/**
 * How long, in whole units, cut off and never rounded up: `46 s`, `1 min 46 s` under ten minutes, `40 min`,
 * `2 h 10`, `3 days` from 48 hours on. A negative length reads as none.
 */
export function duration(milliseconds: number, locale: string = DEFAULT_LOCALE): string {
	const seconds = Math.max(0, Math.floor(milliseconds / SECOND));
	const minutes = Math.floor(seconds / 60);
	if (minutes < 10) {
		return shortDuration(minutes, seconds % 60);
	}
	if (minutes < 60) {
		return `${minutes} min`;
	}
	const hours = Math.floor(minutes / 60);
	return hours < 48 ? hoursAndMinutes(hours, minutes % 60) : unit(Math.floor(hours / 24), locale);
}

/** `just now` under a minute, then `9 min ago`, `2 h 10 ago`, `3 days ago`. */
export function ago(at: Instant, { now, locale }: Omit<Reader, 'zone'>): string {
	const language = languageOf(locale);
	return now - at < MINUTE
		? m.common_time_just_now({}, language)
		: m.common_time_ago({ time: duration(wholeMinutes(now - at), locale) }, language);
}

/**
 * When something is due: `due in 9 min` within the hour (counted up, so that it never says 0), `due today
 * 17:00`, `due tomorrow 09:00`, `due Thu 12:31`; `due now` for its minute, then `overdue by 12 min`.
 */
export function due(at: Instant, reader: Reader): string {
	const language = languageOf(reader.locale);
	const left = at - reader.now;
	if (left <= -MINUTE) {
		return m.common_time_overdue({ time: duration(wholeMinutes(-left), reader.locale) }, language);
	}
	if (left <= 0) {
		return m.common_time_due_now({}, language);
	}
	const minutes = Math.ceil(left / MINUTE);
	return minutes < 60
		? m.common_time_due_in({ time: `${minutes} min` }, language)
		: m.common_time_due({ time: namedWhen(at, reader) }, language);
}

/** As `when`, with `today` said. */
function namedWhen(at: Instant, reader: Reader): string {
	const days = daysFromToday(at, reader);
	if (Math.abs(days) <= 1) {
		const names = new Intl.RelativeTimeFormat(reader.locale ?? DEFAULT_LOCALE, { numeric: 'auto' });
		return `${names.format(days, 'day')} ${clock(at, reader.zone)}`;
	}
	return Math.abs(days) < 7 ? weekdayClock(at, reader) : dayAndClock(at, reader);
}

function daysFromToday(at: Instant, { zone, now }: Reader): number {
	return daysBetween(localDateOf(now, zone), localDateOf(at, zone));
}

/** Most days have no change of the clock near them: two look-ups spare the exact ones. */
function mayChange(at: Instant, zone: Zone): boolean {
	return offsetAt(at - 25 * HOUR, zone) !== offsetAt(at + 25 * HOUR, zone);
}

function offsetAt(at: Instant, zone: Zone): LocalParts['offsetMinutes'] {
	return localParts(at, zone).offsetMinutes;
}

function offset(minutes: number): string {
	const rest = Math.abs(minutes) % 60;
	const hours = Math.floor(Math.abs(minutes) / 60);
	return `UTC${minutes < 0 ? '-' : '+'}${hours}${rest === 0 ? '' : `:${two(rest)}`}`;
}

function shortDuration(minutes: number, seconds: number): string {
	if (minutes === 0) {
		return `${seconds} s`;
	}
	return seconds === 0 ? `${minutes} min` : `${minutes} min ${seconds} s`;
}

function hoursAndMinutes(hours: number, minutes: number): string {
	return minutes === 0 ? `${hours} h` : `${hours} h ${two(minutes)}`;
}

function unit(days: number, locale: string): string {
	return new Intl.NumberFormat(locale, { style: 'unit', unit: 'day', unitDisplay: 'long' }).format(days);
}

function wholeMinutes(milliseconds: number): number {
	return Math.floor(milliseconds / MINUTE) * MINUTE;
}

function dayOfMonth(date: LocalDate): number {
	return Number(date.slice(8));
}

function weekday(date: LocalDate, length: Length, locale: string = DEFAULT_LOCALE): string {
	return name(date, 'weekday', length, locale);
}

function month(date: LocalDate, length: Length, locale: string = DEFAULT_LOCALE): string {
	return name(date, 'month', length, locale);
}

function name(date: LocalDate, field: Field, length: Length, locale: string): string {
	const text = nameFormat(field, length, locale).format(instantOf(date, '12:00', 'UTC'));
	return length === 'short' && locale.startsWith('en') ? text.slice(0, 3) : text;
}

/** A formatter is slow to make and a page needs the same few hundreds of times. */
function nameFormat(field: Field, length: Length, locale: string): Intl.DateTimeFormat {
	const key = `${locale} ${field} ${length}`;
	const known = nameFormats.get(key);
	if (known) {
		return known;
	}
	const format = new Intl.DateTimeFormat(locale, { [field]: length, timeZone: 'UTC' });
	nameFormats.set(key, format);
	return format;
}

/** The language of the catalogue that a locale is of; its words come from there, whatever page is shown. */
function languageOf(locale: string = DEFAULT_LOCALE): { locale: Locale } {
	return { locale: locales.find((one) => one === locale.split('-')[0]) ?? baseLocale };
}

function two(value: number): string {
	return String(value).padStart(2, '0');
}
