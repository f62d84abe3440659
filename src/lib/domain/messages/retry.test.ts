import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { RETRY_KINDS, nextAttempt, readRetryAfter } from './retry';
import type { Attempted } from './retry';

const S = 1000;
const MIN = 60 * S;
const H = 60 * MIN;
const NOW = Date.parse('2025-07-03T11:31:00Z');

/** A random number so near to 1 that the whole delay is waited. */
const FULL = 1 - Number.EPSILON;
const attempted = (change: Partial<Attempted>): Attempted => ({
	kind: 'urgent',
	attempts: 1,
	firstAt: NOW,
	now: NOW,
	expiresAt: null,
	retryAfter: null,
	random: FULL,
	...change
});

/** The longest waits of a kind until it is exhausted, counted up to a number of attempts. */
function waits(kind: Attempted['kind'], expiresAt: number | null, limit = 100): number[] {
	const found: number[] = [];
	let now = NOW;
	for (let attempts = 1; attempts <= limit; attempts += 1) {
		const next = nextAttempt(attempted({ kind, attempts, now, expiresAt }));
		if (next === 'exhausted') {
			break;
		}
		found.push(next - now);
		now = next;
	}
	return found;
}

describe('the schedules', () => {
	it('urgent: at once, then within 5, 15 and 45 s, then the next channel', () => {
		expect(waits('urgent', null)).toEqual([5 * S, 15 * S, 45 * S]);
	});

	it('reminder: within 1, 5, 15, 60 min, then hourly until it expires', () => {
		const expected = [1, 5, 15, 60, 60, 60].map((minutes) => minutes * MIN);
		expect(waits('reminder', NOW + 201 * MIN + 1)).toEqual(expected);
		expect(waits('reminder', NOW + 201 * MIN)).toEqual(expected.slice(0, -1));
	});

	it('mail: within 1, 5, 15, 30 min, then half-hourly to 24 h', () => {
		const found = waits('mail', null);
		expect(found.slice(0, 5)).toEqual([1, 5, 15, 30, 30].map((minutes) => minutes * MIN));
		expect(new Set(found.slice(5))).toEqual(new Set([30 * MIN]));
		const total = found.reduce((sum, wait) => sum + wait, 0);
		expect(total).toBeLessThanOrEqual(24 * H);
		expect(total).toBeGreaterThan(24 * H - 30 * MIN);
	});
});

describe('nextAttempt', () => {
	it.each([
		[0, 0],
		[0.5, 2500],
		[FULL, 5000]
	])('jitter %s of 5 s waits %i ms', (random, wait) => {
		expect(nextAttempt(attempted({ random }))).toBe(NOW + wait);
	});

	it.each([
		['longer than the schedule', 'reminder', 90 * S, NOW + 90 * S],
		['shorter than the schedule', 'reminder', 10 * S, NOW + MIN],
		['no wait', 'reminder', 0, NOW + MIN],
		['as long as an urgent message waits', 'urgent', 45 * S, NOW + 45 * S],
		['longer than an urgent message waits', 'urgent', 45 * S + 1, 'exhausted'],
		['past the last hour of a mail', 'mail', 24 * H + 1, 'exhausted'],
		['the last hour of a mail', 'mail', 24 * H, NOW + 24 * H]
	] as const)('the gateway asks for %s', (_, kind, retryAfter, expected) => {
		expect(nextAttempt(attempted({ kind, retryAfter }))).toBe(expected);
	});

	it.each([
		[NOW + 5 * S + 1, NOW + 5 * S],
		[NOW + 5 * S, 'exhausted'],
		[NOW - 1, 'exhausted']
	])('expiring at %i', (expiresAt, expected) => {
		expect(nextAttempt(attempted({ expiresAt }))).toBe(expected);
	});

	it('property: never before now, before the gateway wants it, or when it has expired', () => {
		const times = fc.integer({ min: 0, max: 48 * H });
		fc.assert(
			fc.property(
				fc.constantFrom(...RETRY_KINDS),
				fc.integer({ min: 1, max: 60 }),
				times,
				fc.option(times),
				fc.option(times),
				fc.double({ min: 0, max: 1, maxExcluded: true, noNaN: true }),
				(kind, attempts, age, expiry, retryAfter, random) => {
					const expiresAt = expiry === null ? null : NOW + expiry;
					const next = nextAttempt({
						kind,
						attempts,
						firstAt: NOW - age,
						now: NOW,
						expiresAt,
						retryAfter,
						random
					});
					const at = next === 'exhausted' ? NOW + (retryAfter ?? 0) : next;
					expect(at).toBeGreaterThanOrEqual(NOW + (retryAfter ?? 0));
					expect(next === 'exhausted' || next < (expiresAt ?? Infinity)).toBe(true);
					expect(Number.isInteger(at)).toBe(true);
				}
			)
		);
	});
});

describe('readRetryAfter', () => {
	it.each([
		['2', 2000],
		['0', 0],
		[' 120 ', 120_000],
		['Thu, 03 Jul 2025 11:32:00 GMT', MIN],
		['Thu, 03 Jul 2025 11:30:00 GMT', 0],
		['-5', null],
		['1.5', null],
		['soon', null],
		['2025-07-03', null],
		['', null],
		[null, null],
		[undefined, null]
	])('%j is %s', (header, expected) => {
		expect(readRetryAfter(header, NOW)).toBe(expected);
	});
});
