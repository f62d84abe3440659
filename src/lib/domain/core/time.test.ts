import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { HOUR, MINUTE, TimeError, addDays, hasClockChange, instantOf, localParts, localTimeOf } from './time';

const utc = (text: string) => Date.parse(text);

/**
 * The clock changes of 2025 in four zones, as the IANA time zone database has them. `gap` is the skipped wall
 * time [first, end), `overlap` the repeated one; `jump` is how far the clock is set, in minutes.
 */
const CHANGES = [
	{
		zone: 'Europe/Berlin',
		jump: 60,
		gap: { date: '2025-03-30', first: '02:00', end: '03:00', at: utc('2025-03-30T01:00:00Z') },
		overlap: { date: '2025-10-26', first: '02:00', end: '03:00', at: utc('2025-10-26T01:00:00Z') }
	},
	{
		zone: 'America/New_York',
		jump: 60,
		gap: { date: '2025-03-09', first: '02:00', end: '03:00', at: utc('2025-03-09T07:00:00Z') },
		overlap: { date: '2025-11-02', first: '01:00', end: '02:00', at: utc('2025-11-02T06:00:00Z') }
	},
	{
		zone: 'Australia/Lord_Howe',
		jump: 30,
		gap: { date: '2025-10-05', first: '02:00', end: '02:30', at: utc('2025-10-04T15:30:00Z') },
		overlap: { date: '2025-04-06', first: '01:30', end: '02:00', at: utc('2025-04-05T15:00:00Z') }
	},
	{
		zone: 'Europe/Dublin',
		jump: 60,
		gap: { date: '2025-03-30', first: '01:00', end: '02:00', at: utc('2025-03-30T01:00:00Z') },
		overlap: { date: '2025-10-26', first: '01:00', end: '02:00', at: utc('2025-10-26T01:00:00Z') }
	}
];
const ZONES = CHANGES.map(({ zone }) => zone);
const TIMES = Array.from({ length: 24 * 60 }, (_, minute) => {
	const hour = String(Math.floor(minute / 60)).padStart(2, '0');
	return `${hour}:${String(minute % 60).padStart(2, '0')}`;
});

/** A second opinion that shares no code with the library: the platform's own formatter. */
const platforms = new Map<string, Intl.DateTimeFormat>();
function platformWall(at: number, zone: string): string {
	const known = platforms.get(zone);
	const format =
		known ?? new Intl.DateTimeFormat('sv-SE', { timeZone: zone, dateStyle: 'short', timeStyle: 'short' });
	platforms.set(zone, format);
	return format.format(at);
}

/** Every wall time of a day and the instants that show it, counted minute by minute. */
function occurrencesOn(date: string, zone: string): Map<string, number[]> {
	const noon = utc(`${date}T12:00:00Z`);
	const found = new Map<string, number[]>();
	for (let at = noon - 40 * HOUR; at < noon + 40 * HOUR; at += MINUTE) {
		const [day = '', time = ''] = platformWall(at, zone).split(' ');
		if (day === date) {
			found.set(time, [...(found.get(time) ?? []), at]);
		}
	}
	return found;
}

describe('instantOf on the days of a clock change', () => {
	it.each(CHANGES)('$zone: every minute of the day with the gap', ({ zone, gap }) => {
		const occurrences = occurrencesOn(gap.date, zone);
		for (const time of TIMES) {
			const skipped = time >= gap.first && time < gap.end;
			const at = skipped ? gap.at : occurrences.get(time)?.[0];
			expect(instantOf(gap.date, time, zone), time).toBe(at);
			expect(localTimeOf(instantOf(gap.date, time, zone), zone)).toBe(skipped ? gap.end : time);
		}
	});

	it.each(CHANGES)('$zone: every minute of the day with the overlap', ({ zone, overlap, jump }) => {
		const occurrences = occurrencesOn(overlap.date, zone);
		for (const time of TIMES) {
			const both = occurrences.get(time) ?? [];
			const repeated = time >= overlap.first && time < overlap.end;
			expect(both, time).toHaveLength(repeated ? 2 : 1);
			expect(instantOf(overlap.date, time, zone), time).toBe(both[0]);
		}
		expect(instantOf(overlap.date, overlap.first, zone)).toBe(overlap.at - jump * MINUTE);
	});

	it.each(CHANGES)('$zone: the days beside a change have nothing special', ({ zone, gap, overlap }) => {
		for (const date of [addDays(gap.date, -1), addDays(gap.date, 1), addDays(overlap.date, -1)]) {
			const occurrences = occurrencesOn(date, zone);
			for (const time of TIMES) {
				expect(occurrences.get(time)).toEqual([instantOf(date, time, zone)]);
			}
		}
	});

	it.each(CHANGES)(
		'$zone: hasClockChange knows both days and no other near them',
		({ zone, gap, overlap }) => {
			for (const { date } of [gap, overlap]) {
				expect(hasClockChange(date, zone)).toBe(true);
				expect(hasClockChange(addDays(date, -1), zone)).toBe(false);
				expect(hasClockChange(addDays(date, 1), zone)).toBe(false);
			}
		}
	);
});

describe('instantOf', () => {
	it.each([
		['2025-03-28', '10:00', 'Europe/Dublin', '2025-03-28T10:00:00Z'],
		['2025-03-31', '10:00', 'Europe/Dublin', '2025-03-31T09:00:00Z'],
		['2025-01-06', '10:00', 'Asia/Kolkata', '2025-01-06T04:30:00Z'],
		['2025-01-06', '00:00', 'UTC', '2025-01-06T00:00:00Z'],
		// Midnight was skipped in Sao Paulo on 2018-11-04.
		['2018-11-04', '00:00', 'America/Sao_Paulo', '2018-11-04T03:00:00Z'],
		// Samoa left out the whole of 2011-12-30.
		['2011-12-30', '12:00', 'Pacific/Apia', '2011-12-30T10:00:00Z']
	])('%s %s %s', (date, time, zone, expected) => {
		expect(instantOf(date, time, zone)).toBe(utc(expected));
	});

	it.each([
		['2025-02-29', '10:00', 'Europe/Dublin', "'2025-02-29' is not a date"],
		['28.3.2025', '10:00', 'Europe/Dublin', "'28.3.2025' is not a date"],
		['2025-03-28', '24:00', 'Europe/Dublin', "'24:00' is not a time of day"],
		['2025-03-28', '9:00', 'Europe/Dublin', "'9:00' is not a time of day"],
		['2025-03-28', '10:00', 'Saltmarsh/Quay', "'Saltmarsh/Quay' is not a time zone"],
		['2025-03-28', '10:00', '', "'' is not a time zone"]
	])('refuses %s %s %s', (date, time, zone, message) => {
		expect(() => instantOf(date, time, zone)).toThrow(TimeError);
		expect(() => instantOf(date, time, zone)).toThrow(message);
	});
});

describe('localParts', () => {
	it('gives the whole of it', () => {
		expect(localParts(utc('2025-07-03T11:31:46.250Z'), 'Europe/Dublin')).toEqual({
			date: '2025-07-03',
			time: '12:31',
			second: 46,
			weekday: 'thu',
			offsetMinutes: 60
		});
		expect(localParts(utc('2025-01-01T00:30:00Z'), 'America/New_York')).toEqual({
			date: '2024-12-31',
			time: '19:30',
			second: 0,
			weekday: 'tue',
			offsetMinutes: -300
		});
	});

	it('agrees with the platform and leads back, over years in four zones', () => {
		const minute = fc.integer({ min: utc('2024-01-01') / MINUTE, max: utc('2031-01-01') / MINUTE });
		fc.assert(
			fc.property(minute, fc.constantFrom(...ZONES), (minutes, zone) => {
				const at = minutes * MINUTE;
				const { date, time } = localParts(at, zone);
				expect(`${date} ${time}`).toBe(platformWall(at, zone));
				// Only the second occurrence in an overlap leads to another instant: the first.
				expect([0, 30 * MINUTE, HOUR]).toContain(at - instantOf(date, time, zone));
			}),
			{ numRuns: 2000 }
		);
	});

	it.each([1.5, NaN, Infinity])('refuses %s', (at) => {
		expect(() => localParts(at, 'UTC')).toThrow('whole milliseconds');
	});
});
