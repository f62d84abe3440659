import { describe, expect, it } from 'vitest';
import { postOperativeDay } from './post-operative-day';

const utc = (text: string) => Date.parse(text);

describe('postOperativeDay', () => {
	it.each([
		['the minute of the operation', '2025-07-03T10:00Z', '2025-07-03T10:00Z', 0],
		['the last minute of that day', '2025-07-03T10:00Z', '2025-07-03T22:59Z', 0],
		['local midnight, an hour before the UTC one', '2025-07-03T10:00Z', '2025-07-03T23:00Z', 1],
		['an operation at 23:30 local, thirty minutes later', '2025-07-03T22:30Z', '2025-07-03T23:00Z', 1],
		['earlier on the day of surgery', '2025-07-03T10:00Z', '2025-07-03T06:00Z', 0],
		['the evening before', '2025-07-03T10:00Z', '2025-07-02T22:59Z', null],
		['over the spring change, a day of 23 hours', '2025-03-29T12:00Z', '2025-03-30T23:00Z', 2],
		['over the autumn change, a day of 25 hours', '2025-10-25T12:00Z', '2025-10-26T23:59Z', 1],
		['ten weeks on', '2025-01-06T10:00Z', '2025-03-17T10:00Z', 70]
	])('%s', (_, operatedAt, now, expected) => {
		expect(postOperativeDay(utc(operatedAt), utc(now), 'Europe/Dublin')).toBe(expected);
	});

	it('counts in the zone of the hospital', () => {
		const operatedAt = utc('2025-07-03T10:00Z');
		const now = utc('2025-07-03T15:00Z');
		expect(postOperativeDay(operatedAt, now, 'Europe/Dublin')).toBe(0);
		expect(postOperativeDay(operatedAt, now, 'Australia/Lord_Howe')).toBe(1);
	});

	it.each([
		['begun: it counts', '2025-07-08T14:00Z', 0],
		['the day after it', '2025-07-09T14:00Z', 1],
		['later today: the first still counts', '2025-07-08T12:00Z', 5]
	])('a return to theatre on day 5, %s', (_, now, expected) => {
		const operations = [utc('2025-07-08T13:00Z'), utc('2025-07-03T10:00Z')];
		expect(postOperativeDay(operations, utc(now), 'Europe/Dublin')).toBe(expected);
	});

	it.each([[null], [[]]])('is null without an operation: %j', (operatedAt) => {
		expect(postOperativeDay(operatedAt, utc('2025-07-03T10:00Z'), 'Europe/Dublin')).toBeNull();
	});
});
