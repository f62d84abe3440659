import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { HOUR, addDays } from '../core/time';
import { bookVisitsBody, startProblem, visitMoveBody } from './forms';

const SINGLE = { startsAt: '2025-03-28T10:00:00Z', minutes: 60, place: 'East Gym' };
const SERIES = {
	from: '2025-01-06',
	weekdays: ['mon', 'wed', 'fri'],
	time: '10:00',
	count: 36,
	minutes: 60,
	place: 'East Gym'
};

/** The first refusal as `pointer: message`; empty when the body is accepted. */
function refusal(schema: z.ZodType, body: unknown): string {
	const issue = schema.safeParse(body).error?.issues[0];
	return issue ? `/${issue.path.join('/')}: ${issue.message}` : '';
}

describe('bookVisitsBody', () => {
	it('reads a single visit', () => {
		expect(bookVisitsBody.parse(SINGLE)).toEqual({
			kind: 'single',
			startsAt: Date.parse('2025-03-28T10:00:00Z'),
			minutes: 60,
			place: 'East Gym'
		});
	});

	it('reads a series', () => {
		expect(bookVisitsBody.parse({ series: SERIES })).toEqual({ kind: 'series', ...SERIES });
	});

	it.each([
		['minutes', 9, 'minutes is 9: it must be a whole number from 10 to 240.'],
		['minutes', 10, ''],
		['minutes', 240, ''],
		['minutes', 241, 'minutes is 241: it must be a whole number from 10 to 240.'],
		['minutes', 45.5, 'minutes is 45.5: it must be a whole number from 10 to 240.'],
		['minutes', '60', 'minutes is "60": it must be a whole number from 10 to 240.'],
		['minutes', undefined, 'minutes is missing: it must be from 10 to 240.'],
		['startsAt', undefined, 'startsAt is missing: give startsAt, minutes and place, or a series.'],
		[
			'startsAt',
			'2025-03-28T10:00',
			'startsAt is "2025-03-28T10:00": it must be an instant such as 2025-03-28T10:00:00Z.'
		],
		[
			'startsAt',
			'2025-02-30T10:00:00Z',
			'startsAt is "2025-02-30T10:00:00Z": it must be an instant such as 2025-03-28T10:00:00Z.'
		],
		['startsAt', 5, 'startsAt is 5: it must be an instant such as 2025-03-28T10:00:00Z.'],
		['place', undefined, 'place is missing.'],
		['place', '  ', 'The place is empty.'],
		['place', 'x'.repeat(80), ''],
		['place', 'x'.repeat(81), 'The place has 81 characters, and the limit is 80.']
	])('single, %s %j', (field, value, message) => {
		expect(refusal(bookVisitsBody, { ...SINGLE, [field]: value })).toBe(message && `/${field}: ${message}`);
	});

	it.each([
		['from', '2025-02-29', 'from is "2025-02-29": it must be a day that exists, as YYYY-MM-DD.'],
		['from', undefined, 'from is missing: it must be a day that exists, as YYYY-MM-DD.'],
		['time', '24:00', 'time is "24:00": it must be a time from 00:00 to 23:59, as HH:MM.'],
		['time', '23:59', ''],
		['count', 0, 'count is 0: it must be a whole number from 1 to 60.'],
		['count', 1, ''],
		['count', 60, ''],
		['count', 61, 'count is 61: it must be a whole number from 1 to 60.'],
		['weekdays', [], 'weekdays is empty: it must hold 1 to 7 days.'],
		['weekdays', ['mon', 'mon'], 'weekdays holds the same day twice.'],
		['weekdays', 'mon', 'weekdays is "mon": it must be a list such as ["mon","wed","fri"].'],
		['minutes', 241, 'minutes is 241: it must be a whole number from 10 to 240.'],
		['place', '', 'The place is empty.']
	])('series, %s %j', (field, value, message) => {
		const body = { series: { ...SERIES, [field]: value } };
		expect(refusal(bookVisitsBody, body)).toBe(message && `/series/${field}: ${message}`);
	});

	it('names a wrong weekday and its place in the list', () => {
		expect(refusal(bookVisitsBody, { series: { ...SERIES, weekdays: ['mon', 'Wednesday'] } })).toBe(
			'/series/weekdays/1: weekdays holds "Wednesday": each must be one of mon, tue, wed, thu, fri, sat, sun.'
		);
	});

	it.each(['startsAt', 'minutes', 'place'] as const)('refuses %s beside a series', (field) => {
		expect(refusal(bookVisitsBody, { series: SERIES, [field]: SINGLE[field] })).toBe(
			`/${field}: ${field} stands beside series: a series has its own, inside.`
		);
	});

	it('refuses what it does not know, and what is no object', () => {
		expect(refusal(bookVisitsBody, { ...SINGLE, repeat: 3 })).toContain('repeat');
		expect(refusal(bookVisitsBody, [])).not.toBe('');
		expect(refusal(bookVisitsBody, {})).toContain('/startsAt: startsAt is missing');
	});

	it('can be described as JSON Schema', () => {
		const described = z.toJSONSchema(bookVisitsBody, { io: 'input' });
		expect(Object.keys(described.properties ?? {})).toEqual(['startsAt', 'minutes', 'place', 'series']);
	});
});

describe('visitMoveBody', () => {
	it.each([
		[undefined, {}],
		[{}, {}],
		[{ reason: ' has a cold ' }, { reason: 'has a cold' }]
	])('%j', (body, expected) => {
		expect(visitMoveBody.parse(body)).toEqual(expected);
	});

	it.each([[{ reason: '' }], [{ reason: 'x'.repeat(1001) }], [{ why: 'x' }], [null], ['x']])(
		'refuses %j',
		(body) => {
			expect(visitMoveBody.safeParse(body).success).toBe(false);
		}
	);
});

describe('startProblem', () => {
	const NOW = Date.parse('2025-07-03T11:31:00Z');
	const last = Date.parse(`${addDays('2025-07-03', 731)}T22:59:00Z`);

	it.each([
		['a millisecond ago', NOW - 1, 'it must not be in the past.'],
		['now', NOW, null],
		['in an hour', NOW + HOUR, null],
		['the last minute of day 731', last, null],
		['a minute later, which is day 732 in Dublin', last + 60_000, 'it must be at most 731 days ahead.']
	])('%s', (_, at, message) => {
		const expected = message && `startsAt is ${new Date(at).toISOString()}: ${message}`;
		expect(startProblem(at, NOW, 'Europe/Dublin')).toBe(expected);
	});
});
