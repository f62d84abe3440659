import { describe, expect, it } from 'vitest';
import { RangeProblem, mondayOf, visitRange } from './range';

const ZONE = 'Europe/Dublin';
/** Tuesday 3 March 2026. */
const NOW = Date.parse('2026-03-03T09:00:00Z');

describe('visitRange', () => {
	it.each([
		['this week', null, null, '2026-03-02T00:00:00Z', '2026-03-09T00:00:00Z'],
		['a week from a day', '2026-03-05', null, '2026-03-05T00:00:00Z', '2026-03-12T00:00:00Z'],
		['both days included', '2026-03-05', '2026-03-06', '2026-03-05T00:00:00Z', '2026-03-07T00:00:00Z'],
		['one day', '2026-03-05', '2026-03-05', '2026-03-05T00:00:00Z', '2026-03-06T00:00:00Z'],
		[
			'over the change of the clock',
			'2026-03-29',
			'2026-03-29',
			'2026-03-29T00:00:00Z',
			'2026-03-29T23:00:00Z'
		],
		[
			'instants',
			'2026-03-05T10:00:00Z',
			'2026-03-05T11:30:00+01:00',
			'2026-03-05T10:00:00Z',
			'2026-03-05T10:30:00Z'
		],
		['62 days with an hour more', '2026-10-01', '2026-12-01', '2026-09-30T23:00:00Z', '2026-12-02T00:00:00Z'],
		['62 days', '2026-01-01', '2026-03-03', '2026-01-01T00:00:00Z', '2026-03-04T00:00:00Z']
	])('%s', (_, from, to, start, end) => {
		expect(visitRange(from, to, ZONE, NOW)).toEqual({ from: Date.parse(start), to: Date.parse(end) });
	});

	it.each([
		['2026-02-30', null, 'from', "from is '2026-02-30'"],
		['tomorrow', null, 'from', 'YYYY-MM-DD'],
		['2026-03-05', '2026-03-04', 'to', 'after from'],
		['2026-03-05T10:00:00Z', '2026-03-05T10:00:00Z', 'to', 'after from'],
		['2026-01-01', '2026-03-04', 'to', 'at most 62 days'],
		['2026-03-05', '', 'to', "to is ''"]
	])('refuses %s to %s', (from, to, field, message) => {
		const call = () => visitRange(from, to, ZONE, NOW);
		expect(call).toThrow(RangeProblem);
		expect(call).toThrow(message);
		expect(call).toThrow(expect.objectContaining({ field }));
	});
});

describe('mondayOf', () => {
	it.each([
		['2026-03-02', '2026-03-02'],
		['2026-03-03', '2026-03-02'],
		['2026-03-08', '2026-03-02'],
		['2026-03-09', '2026-03-09'],
		['2026-01-01', '2025-12-29']
	])('of %s is %s', (date, monday) => {
		expect(mondayOf(date)).toBe(monday);
	});
});
