import { describe, expect, it } from 'vitest';
import { MESSAGE_KINDS, MESSAGE_STATES } from './codes';
import { endOfNumber, endOfResent, mayBeResent } from './log';

describe('mayBeResent', () => {
	it('what did not arrive, or of which nobody knows', () => {
		expect(MESSAGE_STATES.filter(mayBeResent)).toEqual(['accepted', 'undelivered', 'failed']);
	});
});

describe('endOfNumber', () => {
	it.each([
		['+353860000123', '0123'],
		['12', '12'],
		[null, null]
	])('%j: %j', (number, end) => {
		expect(endOfNumber(number)).toBe(end);
	});
});

describe('endOfResent', () => {
	const HOUR = 3_600_000;
	it.each(
		MESSAGE_KINDS.map((kind) => [kind, kind === 'reminder' || kind === 'visit' ? HOUR : 11 * HOUR] as const)
	)('%s', (kind, end) => {
		expect(endOfResent({ kind, createdAt: 0, expiresAt: HOUR }, 10 * HOUR)).toBe(end);
	});

	it('never takes time away', () => {
		expect(endOfResent({ kind: 'mail', createdAt: 10, expiresAt: 1_000 }, 5)).toBe(1_000);
	});
});
