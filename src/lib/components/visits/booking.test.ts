import { describe, expect, it } from 'vitest';
import { bookVisitsBody } from '$lib/domain/visits/forms';
import { bookSeriesForm, bookVisitForm } from '$lib/domain/visits/page-forms';
import {
	bookingField,
	bookingRefusal,
	emptyDraft,
	nextDays,
	planOf,
	typedOf,
	type BookingDraft
} from './booking';

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

/** What the form says of a draft before it is sent, by field. */
function said(change: Partial<BookingDraft>, base = SINGLE): Record<string, string> {
	const schema = base.kind === 'series' ? bookSeriesForm : bookVisitForm;
	const { error } = schema.safeParse({ patient: 'p', ...typedOf({ ...base, ...change }) });
	return Object.fromEntries(error?.issues.map(({ path, message }) => [String(path[0]), message]) ?? []);
}

const plan = (change: Partial<BookingDraft>, base = SINGLE) => planOf({ ...base, ...change }, ZONE, NOW);

describe('a single visit', () => {
	it('is planned on its day and asked for as an instant', () => {
		const { planned, refused, body } = plan({});
		expect(planned.map(({ localDate, localTime }) => `${localDate} ${localTime}`)).toEqual([
			'2026-03-06 10:00'
		]);
		expect(refused).toBeNull();
		expect(body).toEqual({ startsAt: '2026-03-06T10:00:00.000Z', minutes: 60, place: 'east-gym' });
	});

	it('is asked for the same whatever way its day and time were typed', () => {
		expect(plan({ date: '6 3 2026', time: '1000' })).toEqual(plan({}));
	});

	it('is offered the three days after today', () => {
		expect(nextDays(NOW, ZONE)).toEqual(['2026-03-04', '2026-03-05', '2026-03-06']);
	});

	it('names what was typed where it is no day and no time', () => {
		expect(said({ date: '32 3 2026', time: '24:00' })).toEqual({
			date: 'Day: “32 3 2026” is no day; write one that exists, such as 14 12 2026.',
			time: 'Time: “24:00” is no time; write one from 00:00 to 23:59, such as 9:30.'
		});
		expect(said({ date: '', time: ' ' })).toEqual({
			date: 'Day: write a day, such as 14 12 2026.',
			time: 'Time: write one from 00:00 to 23:59, such as 9:30.'
		});
	});

	it('leaves to the server to name what is no day, where it could not be said before', () => {
		expect(plan({ date: '32 3 2026' }).body).toMatchObject({ startsAt: '32 3 2026T10:00' });
	});

	it('names a number that was typed wrongly, and asks for one that was not typed', () => {
		expect(said({ minutes: '1e', count: '12,5' }, SERIES)).toEqual({
			minutes: 'Minutes: “1e” is no number; write a whole number from 10 to 240.',
			count: 'Number of visits: 12.5 cannot be taken; write a whole number from 1 to 60.'
		});
		expect(said({ minutes: ' ', count: '' }, SERIES)).toEqual({
			minutes: 'Minutes is empty: write a whole number from 10 to 240.',
			count: 'Number of visits is empty: write a whole number from 1 to 60.'
		});
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
		[{ date: '' }, SERIES, ['from']]
	])('%j', (change, base, fields) => {
		expect(Object.keys(said(change, base))).toEqual(fields);
	});

	it.each<[Partial<BookingDraft>, BookingDraft, boolean]>([
		// Today at 08:59 has passed, at 09:00 has not.
		[{ date: '2026-03-03', time: '08:59' }, SINGLE, true],
		[{ date: '2026-03-03', time: '09:00' }, SINGLE, false],
		// Two years and a day ahead, 731 days, is the last day.
		[{ date: '2028-03-03' }, SINGLE, false],
		[{ date: '2028-03-04' }, SINGLE, true],
		// What is no day yet is not refused while it is typed.
		[{ date: '3' }, SINGLE, false]
	])('%j is refused while it is typed: %j', (change, base, refused) => {
		expect(plan(change, base).refused !== null).toBe(refused);
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
		['startsAt', 'date'],
		['series/from', 'from'],
		['series/time', 'time'],
		['minutes', 'minutes'],
		['series/place', 'place'],
		['series/weekdays/0', 'weekdays']
	])('%s is %s', (pointer, field) => {
		expect(bookingField(pointer)).toBe(field);
		const refused = { title: 'Not done', text: '', signIn: false, fields: { [pointer]: 'Why.' } };
		expect(bookingRefusal(refused)).toEqual({ ...refused, fields: { [field]: 'Why.' } });
	});
});

describe('closed days', () => {
	const closed = new Set(['2026-03-06']);
	const withClosed = (base: BookingDraft) => planOf(base, ZONE, NOW, closed);

	it('a single visit on one is refused, and nothing is shown as if it could be booked', () => {
		const { planned, refused } = withClosed(SINGLE);
		expect(planned).toEqual([]);
		expect(refused).toBe('6 Mar 2026 is a closed day: choose another day.');
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
