import { describe, expect, it } from 'vitest';
import {
	TimeError,
	WEEKDAYS,
	addDays,
	daysBetween,
	isLocalDate,
	isLocalTime,
	isZone,
	localDateOf,
	weekdayOf
} from './time';

const utc = (text: string) => Date.parse(text);

describe('local dates', () => {
	it.each([
		['2025-03-29', 1, '2025-03-30'],
		['2025-03-30', 1, '2025-03-31'],
		['2024-02-28', 1, '2024-02-29'],
		['2025-02-28', 1, '2025-03-01'],
		['2025-01-01', -1, '2024-12-31'],
		['2025-01-06', 0, '2025-01-06'],
		// A window of 36 weeks from its first day, worked by hand: 252 days on, the last day excluded.
		['2025-01-06', 36 * 7 - 1, '2025-09-14']
	])('%s and %i days is %s', (date, days, expected) => {
		expect(addDays(date, days)).toBe(expected);
		expect(daysBetween(date, expected)).toBe(days);
		expect(daysBetween(expected, date)).toBe(days === 0 ? 0 : -days);
	});

	it.each([
		['2025-01-06', 'mon'],
		['2025-03-28', 'fri'],
		['2024-02-29', 'thu'],
		['2000-01-01', 'sat'],
		['1958-09-05', 'fri'],
		['2025-03-30', 'sun']
	])('%s is a %s', (date, weekday) => {
		expect(weekdayOf(date)).toBe(weekday);
	});

	it('weekdays follow each other', () => {
		const days = Array.from({ length: 14 }, (_, day) => weekdayOf(addDays('2025-10-20', day)));
		expect(days).toEqual([...WEEKDAYS, ...WEEKDAYS]);
	});

	it('refuses half days and years out of range', () => {
		expect(() => addDays('2025-01-06', 0.5)).toThrow('it must be whole');
		expect(() => addDays('9999-12-31', 1)).toThrow(TimeError);
		expect(() => daysBetween('2025-01-06', 'tomorrow')).toThrow("'tomorrow' is not a date");
	});

	it('the local day of an instant turns at local midnight', () => {
		expect(localDateOf(utc('2025-07-03T22:59:59.999Z'), 'Europe/Dublin')).toBe('2025-07-03');
		expect(localDateOf(utc('2025-07-03T23:00:00Z'), 'Europe/Dublin')).toBe('2025-07-04');
	});
});

describe('what is a date, a time, a zone', () => {
	it.each([
		['2024-02-29', true],
		['2023-02-29', false],
		['2025-04-31', false],
		['2025-13-01', false],
		['2025-00-10', false],
		['2025-1-6', false],
		['2025-01-06T10:00', false],
		['', false]
	])('date %j: %s', (value, expected) => {
		expect(isLocalDate(value)).toBe(expected);
	});

	it.each([
		['00:00', true],
		['23:59', true],
		['24:00', false],
		['12:60', false],
		['7:05', false],
		['07:05:00', false]
	])('time %j: %s', (value, expected) => {
		expect(isLocalTime(value)).toBe(expected);
	});

	it.each([
		['Europe/Dublin', true],
		['UTC', true],
		['Australia/Lord_Howe', true],
		['Europe/Saltmarsh', false],
		['+01:00', false],
		['', false]
	])('zone %j: %s', (value, expected) => {
		expect(isZone(value)).toBe(expected);
	});
});
