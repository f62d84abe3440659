import { describe, expect, it } from 'vitest';
import { bookVisitsBody } from '$lib/domain/visits/forms';
import { bookingField, emptyDraft, nextDays, planOf, type BookingDraft } from './booking';

const ZONE = 'Europe/Dublin';
/** A Tuesday, 09:00 in Dublin. */
const NOW = Date.parse('2026-03-03T09:00:00Z');

const SINGLE: BookingDraft = { ...emptyDraft('east-gym'), date: '2026-03-06', time: '10:00' };
const SERIES: BookingDraft = {
	...SINGLE,
	kind: 'series',
	date: '2026-03-04',
	weekdays: ['mon', 'wed', 'fri'],
	count: '4'
};

const plan = (change: Partial<BookingDraft>, base = SINGLE) => planOf({ ...base, ...change }, ZONE, NOW);

describe('a single visit', () => {
	it('is planned on its day and asked for as an instant', () => {
		const { planned, problems, body } = plan({});
		expect(planned.map(({ localDate, localTime }) => `${localDate} ${localTime}`)).toEqual([
			'2026-03-06 10:00'
		]);
		expect(problems).toEqual({});
		expect(body).toEqual({ startsAt: '2026-03-06T10:00:00.000Z', minutes: 60, place: 'east-gym' });
	});

	it('is asked for the same whatever way its day and time were typed', () => {
		expect(plan({ date: '6 3 2026', time: '1000' })).toEqual(plan({}));
	});

	it('is offered the three days after today', () => {
		expect(nextDays(NOW, ZONE)).toEqual(['2026-03-04', '2026-03-05', '2026-03-06']);
	});

	it('names what was typed where it is no day and no time', () => {
		const { problems } = plan({ date: '32 3 2026', time: '24:00' });
		expect(problems.date).toContain('“32 3 2026”');
		expect(problems.time).toContain('“24:00”');
	});

	it('names a number that was typed wrongly, and asks for one that was not typed', () => {
		const { problems } = plan({ minutes: '1e', count: '12,5' }, SERIES);
		expect(problems.minutes).toContain('“1e”');
		expect(problems.count).toContain('“12,5”');
		const empty = plan({ minutes: ' ', count: '' }, SERIES).problems;
		expect(empty.minutes).toBe('Minutes: write a whole number from 10 to 240.');
		expect(empty.count).toBe('Number of visits: write a whole number from 1 to 60.');
	});

	it('is an hour earlier in UTC once the clock has changed', () => {
		expect(plan({ date: '2026-03-30' }).body).toMatchObject({ startsAt: '2026-03-30T09:00:00.000Z' });
	});
});

describe('a series', () => {
	it('names its days before anything is booked', () => {
		const { planned, body } = plan({}, SERIES);
		expect(planned.map(({ localDate }) => localDate)).toEqual([
			'2026-03-04',
			'2026-03-06',
			'2026-03-09',
			'2026-03-11'
		]);
		expect(body).toEqual({
			series: {
				from: '2026-03-04',
				weekdays: ['mon', 'wed', 'fri'],
				time: '10:00',
				count: 4,
				minutes: 60,
				place: 'east-gym'
			}
		});
	});

	it.each([SINGLE, SERIES])('makes a body that the JSON API takes', (draft) => {
		expect(bookVisitsBody.safeParse(planOf(draft, ZONE, NOW).body).success).toBe(true);
	});
});

describe('what is wrong', () => {
	it.each<[Partial<BookingDraft>, BookingDraft, string[]]>([
		[{ date: '' }, SINGLE, ['date']],
		[{ date: '2026-02-29' }, SINGLE, ['date']],
		[{ time: '24:00' }, SINGLE, ['time']],
		[{ minutes: '' }, SINGLE, ['minutes']],
		[{ minutes: '1e' }, SINGLE, ['minutes']],
		[{ minutes: '9' }, SINGLE, ['minutes']],
		[{ minutes: '10' }, SINGLE, []],
		[{ minutes: '240' }, SINGLE, []],
		[{ minutes: '241' }, SINGLE, ['minutes']],
		[{ minutes: '45,5' }, SINGLE, ['minutes']],
		[{ place: '' }, SINGLE, ['place']],
		[{ weekdays: [], count: '1e' }, SINGLE, []],
		[{ weekdays: [] }, SERIES, ['weekdays']],
		[{ count: '0' }, SERIES, ['count']],
		[{ count: '1' }, SERIES, []],
		[{ count: '60' }, SERIES, []],
		[{ count: '61' }, SERIES, ['count']],
		[{ count: '' }, SERIES, ['count']],
		[{ count: '1e' }, SERIES, ['count']],
		// Today at 08:59 has passed, at 09:00 has not.
		[{ date: '2026-03-03', time: '08:59' }, SINGLE, ['date']],
		[{ date: '2026-03-03', time: '09:00' }, SINGLE, []],
		// Two years and a day ahead, 731 days, is the last day.
		[{ date: '2028-03-03' }, SINGLE, []],
		[{ date: '2028-03-04' }, SINGLE, ['date']]
	])('%j', (change, base, fields) => {
		const { problems, body } = plan(change, base);
		expect(Object.keys(problems)).toEqual(fields);
		expect(body === null).toBe(fields.length > 0);
	});

	it.each([
		['2026-03-03', '08:59', 0],
		['2026-03-03', '09:00', 1],
		['2028-03-03', '10:00', 1],
		['2028-03-04', '10:00', 0]
	])('on %s at %s leaves %d visits in view', (date, time, count) => {
		expect(plan({ date, time }).planned).toHaveLength(count);
	});

	it('still shows the days of a series whose length in minutes is missing', () => {
		expect(plan({ minutes: '' }, SERIES).planned).toHaveLength(4);
	});
});

describe('bookingField', () => {
	it.each([
		['/startsAt', 'date'],
		['/series/from', 'date'],
		['/series/time', 'time'],
		['/minutes', 'minutes'],
		['/series/place', 'place'],
		['/series/weekdays/0', 'date']
	])('%s is %s', (pointer, field) => {
		expect(bookingField(pointer)).toBe(field);
	});
});

describe('closed days', () => {
	const closed = new Set(['2026-03-06']);
	const withClosed = (base: BookingDraft) => planOf(base, ZONE, NOW, closed);

	it('a single visit on one is refused, and nothing is shown as if it could be booked', () => {
		const { planned, problems, body } = withClosed(SINGLE);
		expect([planned, body]).toEqual([[], null]);
		expect(problems.date).toBe('6 Mar 2026 is a closed day: choose another day.');
	});

	it('a series steps over one, and says which', () => {
		const { planned, skipped } = withClosed(SERIES);
		expect(planned.map(({ localDate }) => localDate)).toEqual([
			'2026-03-04',
			'2026-03-09',
			'2026-03-11',
			'2026-03-13'
		]);
		expect(skipped).toEqual(['2026-03-06']);
	});
});

describe('what no reminder goes of', () => {
	it.each([
		['2026-03-03', '16:00', 1],
		['2026-03-04', '10:00', 0],
		['2026-03-04', '09:00', 0]
	])('%s %s, booked at 09:00: %i', (date, time, count) => {
		expect(plan({ date, time }).withoutReminder).toBe(count);
	});
});
