import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { allowedAround, clampToHours, isWithinHours, nextWithinHours } from './hours';
import { HOUR, MINUTE, TimeError, localTimeOf } from './time';

const utc = (text: string) => Date.parse(text);
const DAYTIME = { from: '08:00', to: '20:00' };

describe('hours of the day in Dublin in winter, 08:00 to 20:00', () => {
	it.each([
		// The night's middle is 02:00, where both sides are six hours away; the last minute before is 19:59.
		['07:59', '08:00', '08:00'],
		['08:00', '08:00', '08:00'],
		['12:00', '12:00', '12:00'],
		['19:59', '19:59', '19:59'],
		['20:00', '19:59', 'next 08:00'],
		['23:59', '19:59', 'next 08:00'],
		['01:59', 'previous 19:59', '08:00'],
		['02:00', '08:00', '08:00'],
		['00:00', 'previous 19:59', '08:00']
	])('%s: nearest %s, next %s', (time, nearest, next) => {
		const at = utc(`2025-01-15T${time}:00Z`);
		const expected = (answer: string) => {
			const day = answer.startsWith('previous') ? '14' : answer.startsWith('next') ? '16' : '15';
			return utc(`2025-01-${day}T${answer.slice(-5)}:00Z`);
		};
		expect(clampToHours(at, 'Europe/Dublin', '08:00', '20:00')).toBe(expected(nearest));
		expect(nextWithinHours(at, 'Europe/Dublin', DAYTIME)).toBe(expected(next));
	});

	it('takes the earlier side when both are equally near', () => {
		const at = utc('2025-01-15T01:59:30Z');
		expect(clampToHours(at, 'Europe/Dublin', '08:00', '20:00')).toBe(utc('2025-01-14T19:59:00Z'));
	});

	it('the last second before closing is allowed, the closing minute is not', () => {
		expect(isWithinHours(utc('2025-01-15T19:59:59.999Z'), 'Europe/Dublin', DAYTIME)).toBe(true);
		expect(isWithinHours(utc('2025-01-15T20:00:00Z'), 'Europe/Dublin', DAYTIME)).toBe(false);
	});

	it.each([
		['20:00', '08:00'],
		['08:00', '08:00']
	])('refuses the hours %s to %s', (from, to) => {
		expect(() => clampToHours(0, 'UTC', from, to)).toThrow(TimeError);
	});
});

describe('over a year in four zones', () => {
	const zones = fc.constantFrom('Europe/Berlin', 'America/New_York', 'Australia/Lord_Howe', 'Europe/Dublin');
	const minutes = fc.integer({ min: utc('2025-01-01') / MINUTE, max: utc('2026-01-01') / MINUTE });

	it('both sides are allowed, on their side, and no further than a night', () => {
		fc.assert(
			fc.property(minutes, zones, (minute, zone) => {
				const at = minute * MINUTE;
				const { before, after } = allowedAround(at, zone, DAYTIME);
				for (const side of [before, after]) {
					const time = localTimeOf(side, zone);
					expect(time >= '08:00' && time < '20:00', time).toBe(true);
				}
				expect(before).toBeLessThanOrEqual(at);
				expect(after).toBeGreaterThanOrEqual(at);
				expect(after - before).toBeLessThanOrEqual(13 * HOUR + MINUTE);
				expect(isWithinHours(at, zone, DAYTIME)).toBe(before === after);
			}),
			{ numRuns: 2000 }
		);
	});
});

describe('hours that begin or end in a clock change', () => {
	it('opens at the end of a gap', () => {
		const hours = { from: '02:30', to: '20:00' };
		expect(nextWithinHours(utc('2025-03-30T00:00:00Z'), 'Europe/Berlin', hours)).toBe(
			utc('2025-03-30T01:00:00Z')
		);
	});

	it('opens once in an overlap, at the first occurrence', () => {
		const hours = { from: '02:30', to: '20:00' };
		expect(nextWithinHours(utc('2025-10-25T23:00:00Z'), 'Europe/Berlin', hours)).toBe(
			utc('2025-10-26T00:30:00Z')
		);
		// 02:15 for the second time: the day has been open for three quarters of an hour.
		expect(isWithinHours(utc('2025-10-26T01:15:00Z'), 'Europe/Berlin', hours)).toBe(true);
	});
});
