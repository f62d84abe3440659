import { describe, expect, it } from 'vitest';
import {
	ago,
	clock,
	day,
	dayAndClock,
	due,
	duration,
	localeOf,
	longDay,
	shortDay,
	weekdayClock,
	when
} from './format';

const utc = (text: string) => Date.parse(text);
const S = 1000;
const MIN = 60 * S;
const H = 60 * MIN;

/** A reader in Dublin on Thursday 3 July 2025 at 12:31, an hour ahead of UTC. */
const NOW = utc('2025-07-03T11:31:00Z');
const READER = { zone: 'Europe/Dublin', now: NOW };

describe('days', () => {
	it.each([
		['1958-09-05', '5 Sep 1958', 'Friday 5 September 1958'],
		['2025-06-30', '30 Jun 2025', 'Monday 30 June 2025'],
		['2024-02-29', '29 Feb 2024', 'Thursday 29 February 2024'],
		['2025-12-01', '1 Dec 2025', 'Monday 1 December 2025']
	])('%s', (date, short, long) => {
		expect(day(date)).toBe(short);
		expect(longDay(date)).toBe(long);
	});

	it.each([
		['2025-09-04', 'Thu 4 Sep'],
		['2025-01-01', 'Wed 1 Jan'],
		['2026-01-01', 'Thu 1 Jan 2026'],
		['2024-12-31', 'Tue 31 Dec 2024']
	])('%s is %s for a reader in 2025', (date, expected) => {
		expect(shortDay(date, READER)).toBe(expected);
	});

	it('speaks another language where Intl does', () => {
		expect(longDay('2025-09-05', 'fr')).toBe('vendredi 5 septembre 2025');
		expect(longDay('2025-09-05', 'es')).toBe('viernes 5 de septiembre de 2025');
		expect(duration(3 * 24 * H, 'de')).toBe('3 Tage');
	});
});

describe('times of day', () => {
	it.each([
		['2025-07-03T11:31:46Z', 'Europe/Dublin', '12:31', 'Thu 12:31'],
		['2025-07-03T23:05:00Z', 'Europe/Dublin', '00:05', 'Fri 00:05'],
		['2025-07-03T11:31:00Z', 'America/New_York', '07:31', 'Thu 07:31'],
		// On the day of a clock change the offset tells the two half past ones apart.
		['2025-10-26T00:30:00Z', 'Europe/Dublin', '01:30 (UTC+1)', 'Sun 01:30 (UTC+1)'],
		['2025-10-26T01:30:00Z', 'Europe/Dublin', '01:30 (UTC+0)', 'Sun 01:30 (UTC+0)'],
		['2025-10-27T01:30:00Z', 'Europe/Dublin', '01:30', 'Mon 01:30'],
		['2025-10-25T12:00:00Z', 'Europe/Dublin', '13:00', 'Sat 13:00'],
		['2025-10-04T22:00:00Z', 'Australia/Lord_Howe', '09:00 (UTC+11)', 'Sun 09:00 (UTC+11)'],
		['2025-10-04T15:00:00Z', 'Australia/Lord_Howe', '01:30 (UTC+10:30)', 'Sun 01:30 (UTC+10:30)'],
		['2025-03-09T12:00:00Z', 'America/New_York', '08:00 (UTC-4)', 'Sun 08:00 (UTC-4)']
	])('%s in %s', (at, zone, short, withWeekday) => {
		expect(clock(utc(at), zone)).toBe(short);
		expect(weekdayClock(utc(at), { zone })).toBe(withWeekday);
	});

	it.each([
		['2025-07-03T06:00:00Z', '07:00'],
		['2025-07-03T22:59:00Z', '23:59'],
		['2025-07-03T23:00:00Z', 'tomorrow 00:00'],
		['2025-07-02T22:59:00Z', 'yesterday 23:59'],
		['2025-07-01T12:00:00Z', 'Tue 13:00'],
		['2025-07-09T12:00:00Z', 'Wed 13:00'],
		['2025-07-10T12:00:00Z', 'Thu 10 Jul 13:00'],
		['2025-06-26T12:00:00Z', 'Thu 26 Jun 13:00'],
		['2024-07-03T12:00:00Z', 'Wed 3 Jul 2024 13:00']
	])('%s is %s', (at, expected) => {
		expect(when(utc(at), READER)).toBe(expected);
	});

	it('the day with its time', () => {
		expect(dayAndClock(utc('2025-09-04T11:31:00Z'), READER)).toBe('Thu 4 Sep 12:31');
		expect(dayAndClock(utc('2026-01-05T10:00:00Z'), READER)).toBe('Mon 5 Jan 2026 10:00');
	});
});

describe('duration', () => {
	it.each([
		[-5 * S, '0 s'],
		[0, '0 s'],
		[999, '0 s'],
		[46 * S, '46 s'],
		[59 * S + 999, '59 s'],
		[MIN, '1 min'],
		[MIN + 46 * S, '1 min 46 s'],
		[9 * MIN + 59 * S, '9 min 59 s'],
		[10 * MIN, '10 min'],
		[10 * MIN + 59 * S, '10 min'],
		[40 * MIN, '40 min'],
		[H - S, '59 min'],
		[H, '1 h'],
		[H + 5 * MIN, '1 h 05'],
		[2 * H + 10 * MIN, '2 h 10'],
		[47 * H + 59 * MIN, '47 h 59'],
		[48 * H, '2 days'],
		[72 * H - S, '2 days'],
		[72 * H, '3 days']
	])('%i ms is %s', (milliseconds, expected) => {
		expect(duration(milliseconds)).toBe(expected);
	});
});

describe('ago', () => {
	it.each([
		[-MIN, 'just now'],
		[59 * S, 'just now'],
		[MIN, '1 min ago'],
		[9 * MIN + 59 * S, '9 min ago'],
		[2 * H + 10 * MIN, '2 h 10 ago'],
		[72 * H, '3 days ago']
	])('%i ms before now: %s', (milliseconds, expected) => {
		expect(ago(NOW - milliseconds, READER)).toBe(expected);
	});
});

describe('due', () => {
	it.each([
		[8 * MIN + S, 'due in 9 min'],
		[9 * MIN, 'due in 9 min'],
		[1, 'due in 1 min'],
		[59 * MIN, 'due in 59 min'],
		[59 * MIN + 1, 'due today 13:30'],
		[H, 'due today 13:31'],
		[utc('2025-07-03T16:00:00Z') - NOW, 'due today 17:00'],
		[utc('2025-07-04T08:00:00Z') - NOW, 'due tomorrow 09:00'],
		[utc('2025-07-08T11:31:00Z') - NOW, 'due Tue 12:31'],
		[utc('2025-07-10T11:31:00Z') - NOW, 'due Thu 10 Jul 12:31'],
		[0, 'due now'],
		[-59 * S, 'due now'],
		[-MIN, 'overdue by 1 min'],
		[-12 * MIN - 59 * S, 'overdue by 12 min'],
		[-2 * H - 10 * MIN, 'overdue by 2 h 10'],
		[-72 * H, 'overdue by 3 days']
	])('%i ms from now: %s', (milliseconds, expected) => {
		expect(due(NOW + milliseconds, READER)).toBe(expected);
	});
});

describe('in Spanish', () => {
	const READS = { ...READER, locale: 'es' };

	it.each([
		[59 * S, 'ahora mismo'],
		[MIN, 'hace 1 min'],
		[2 * H + 10 * MIN, 'hace 2 h 10'],
		[72 * H, 'hace 3 días']
	])('%i ms before now: %s', (milliseconds, expected) => {
		expect(ago(NOW - milliseconds, READS)).toBe(expected);
	});

	it.each([
		[59 * MIN, 'vence en 59 min'],
		[H, 'vence hoy 13:31'],
		[utc('2025-07-04T08:00:00Z') - NOW, 'vence mañana 09:00'],
		[utc('2025-07-08T11:31:00Z') - NOW, 'vence mar 12:31'],
		[0, 'vence ahora'],
		[-MIN, 'vencido hace 1 min'],
		[-72 * H, 'vencido hace 3 días']
	])('%i ms from now: %s', (milliseconds, expected) => {
		expect(due(NOW + milliseconds, READS)).toBe(expected);
	});

	it.each([
		['2025-07-03T16:00:00Z', '17:00'],
		['2025-07-02T11:31:00Z', 'ayer 12:31'],
		['2025-07-10T11:31:00Z', 'jue 10 jul 12:31']
	])('%s is %s', (at, expected) => {
		expect(when(utc(at), READS)).toBe(expected);
	});

	it('a locale without words of its own reads English', () => {
		expect(ago(NOW, { ...READER, locale: 'fr' })).toBe('just now');
	});

	it('days are written as the language of the page writes them', () => {
		expect([localeOf('en'), localeOf('es')]).toEqual(['en-IE', 'es']);
	});
});
