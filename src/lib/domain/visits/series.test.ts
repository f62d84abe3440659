import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { WEEKDAYS, addDays, localParts, weekdayOf } from '../core/time';
import type { Weekday } from '../core/time';
import { planSeries, planVisit, rederive, skippedDays } from './series';

const utc = (text: string) => Date.parse(text);
const ZONES = ['Europe/Berlin', 'America/New_York', 'Australia/Lord_Howe', 'Europe/Dublin'];

function series(from: string, weekdays: Weekday[], time: string, count: number) {
	return { from, weekdays, time, count, minutes: 60 };
}

describe('planSeries', () => {
	// 36 supervised visits, the number that US Medicare covers at first: 42 CFR 410.49. The dates are worked by hand.
	it.each([
		['Monday, Wednesday, Friday', ['mon', 'wed', 'fri'], '2025-03-28'],
		['Monday, Thursday', ['mon', 'thu'], '2025-05-08'],
		['in any order', ['fri', 'mon', 'wed'], '2025-03-28'],
		['every day', [...WEEKDAYS], '2025-02-10']
	] as [string, Weekday[], string][])('the 36th from 2025-01-06, %s', (_, weekdays, expected) => {
		const visits = planSeries(series('2025-01-06', weekdays, '10:00', 36), 'Europe/Dublin');
		expect(visits).toHaveLength(36);
		expect(visits[0]?.localDate).toBe('2025-01-06');
		expect(visits.at(-1)?.localDate).toBe(expected);
	});

	it('begins on the first weekday that fits, not on the day given', () => {
		const [first] = planSeries(series('2025-01-07', ['mon'], '10:00', 1), 'Europe/Dublin');
		expect(first).toEqual({
			localDate: '2025-01-13',
			localTime: '10:00',
			zone: 'Europe/Dublin',
			startsAt: utc('2025-01-13T10:00:00Z'),
			minutes: 60
		});
	});

	it.each([
		['Europe/Berlin', '2025-03-28', '2025-03-28T09:00Z', '2025-03-31T08:00Z'],
		['Europe/Berlin', '2025-10-24', '2025-10-24T08:00Z', '2025-10-27T09:00Z'],
		['America/New_York', '2025-03-07', '2025-03-07T15:00Z', '2025-03-10T14:00Z'],
		['America/New_York', '2025-10-31', '2025-10-31T14:00Z', '2025-11-03T15:00Z'],
		['Australia/Lord_Howe', '2025-04-04', '2025-04-03T23:00Z', '2025-04-06T23:30Z'],
		['Australia/Lord_Howe', '2025-10-03', '2025-10-02T23:30Z', '2025-10-05T23:00Z'],
		['Europe/Dublin', '2025-03-28', '2025-03-28T10:00Z', '2025-03-31T09:00Z'],
		['Europe/Dublin', '2025-10-24', '2025-10-24T09:00Z', '2025-10-27T10:00Z']
	])('%s, Friday and Monday around the change after %s stay at 10:00', (zone, from, friday, monday) => {
		const visits = planSeries(series(from, ['fri', 'mon'], '10:00', 2), zone);
		expect(visits.map(({ startsAt }) => startsAt)).toEqual([utc(friday), utc(monday)]);
	});

	it('a visit in the skipped hour begins after it, and keeps what was agreed', () => {
		const [visit] = planSeries(series('2025-03-30', ['sun'], '02:30', 1), 'Europe/Berlin');
		expect(visit?.localTime).toBe('02:30');
		expect(visit?.startsAt).toBe(utc('2025-03-30T01:00Z'));
	});

	// In the hour that comes twice the first one counts, whichever half hour or hour the zone repeats.
	it.each([
		['Europe/Berlin', '2025-10-26', '02:30', '2025-10-26T00:30Z'],
		['America/New_York', '2025-11-02', '01:30', '2025-11-02T05:30Z'],
		['Australia/Lord_Howe', '2025-04-06', '01:45', '2025-04-05T14:45Z'],
		['Europe/Dublin', '2025-10-26', '01:30', '2025-10-26T00:30Z']
	])('%s: %s %s happens twice, and the visit is at the first', (zone, from, time, startsAt) => {
		const [visit] = planSeries(series(from, [weekdayOf(from)], time, 1), zone);
		expect(visit).toMatchObject({ localTime: time, startsAt: utc(startsAt) });
	});

	it.each([
		['Europe/Berlin', '2025-03-30', '02:30', '2025-03-30T01:00Z'],
		['America/New_York', '2025-03-09', '02:30', '2025-03-09T07:00Z'],
		['Australia/Lord_Howe', '2025-10-05', '02:15', '2025-10-04T15:30Z'],
		['Europe/Dublin', '2025-03-30', '01:30', '2025-03-30T01:00Z']
	])(
		'%s: %s %s does not happen, and the visit is at the first minute after',
		(zone, from, time, startsAt) => {
			const [visit] = planSeries(series(from, [weekdayOf(from)], time, 1), zone);
			expect(visit).toMatchObject({ localTime: time, startsAt: utc(startsAt) });
		}
	);

	it('property: right days, right time, in order, none left out', () => {
		const dates = fc.integer({ min: 0, max: 730 }).map((days) => addDays('2024-06-01', days));
		const weekdays = fc.uniqueArray(fc.constantFrom(...WEEKDAYS), { minLength: 1 });
		fc.assert(
			fc.property(
				dates,
				weekdays,
				fc.integer({ min: 1, max: 60 }),
				fc.constantFrom(...ZONES),
				(from, days, count, zone) => {
					const visits = planSeries(series(from, days, '10:00', count), zone);
					const wanted = Array.from({ length: 7 * count }, (_, day) => addDays(from, day))
						.filter((date) => days.includes(weekdayOf(date)))
						.slice(0, count);
					expect(visits.map(({ localDate }) => localDate)).toEqual(wanted);
					for (const { startsAt, localDate } of visits) {
						expect(localParts(startsAt, zone)).toMatchObject({ date: localDate, time: '10:00' });
					}
				}
			)
		);
	});

	// Saint Patrick's Day and an invented Friday: the two visits that fall on them come after the last.
	it('steps over closed days and is as long as was asked', () => {
		const wanted = series('2025-01-06', ['mon', 'wed', 'fri'], '10:00', 36);
		const closed = new Set(['2025-03-17', '2025-01-10', '2025-01-11', '2025-12-25']);
		const visits = planSeries(wanted, 'Europe/Dublin', closed);
		expect(visits).toHaveLength(36);
		expect(visits.map(({ localDate }) => localDate).filter((date) => closed.has(date))).toEqual([]);
		expect(visits.at(-1)?.localDate).toBe('2025-04-02');
		expect(skippedDays(wanted, visits, closed)).toEqual(['2025-01-10', '2025-03-17']);
	});

	it('refuses a series without weekdays instead of looking for ever', () => {
		expect(() => planSeries(series('2025-01-06', [], '10:00', 1), 'Europe/Dublin')).toThrow(
			'at least one weekday'
		);
	});
});

describe('planVisit', () => {
	it('keeps the wall time of the zone beside the instant', () => {
		expect(planVisit(utc('2025-03-31T09:00Z'), 45, 'Europe/Dublin')).toEqual({
			localDate: '2025-03-31',
			localTime: '10:00',
			zone: 'Europe/Dublin',
			startsAt: utc('2025-03-31T09:00Z'),
			minutes: 45
		});
	});
});

describe('rederive', () => {
	it('moves the instant to the agreed wall time when the zone rules moved it away', () => {
		const stored = { id: 'a', ...planVisit(utc('2025-03-31T09:00Z'), 45, 'Europe/Dublin') };
		const stale = { ...stored, startsAt: utc('2025-03-31T10:00Z') };
		expect(rederive(stale)).toEqual(stored);
	});
});
