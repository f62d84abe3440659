import { describe, expect, it } from 'vitest';
import { askHolderAt, etaOf, goOnAfterMs, isOpenTo, isSoughtAnew } from './holding';

const T = Date.parse('2026-03-03T09:00:00Z');
const MINUTE = 60_000;

describe('askHolderAt', () => {
	// Common practice, no published source: some time after the minutes given, or after the taking without any.
	it.each([
		['high', null, 10],
		['high', 1, 6],
		['high', 20, 25],
		['medium', null, 30],
		['medium', 10, 40],
		['low', null, 240],
		['low', 5, 245]
	] as const)('%s with %s minutes given: after %s', (grade, eta, minutes) => {
		expect(askHolderAt(grade, T, eta, null)).toBe(T + minutes * MINUTE);
	});

	it.each([
		['before', 9, 9],
		['with', 10, 10],
		['after', 11, 10]
	])('needed by a minute %s the patience ends: after %s', (_, neededIn, minutes) => {
		expect(askHolderAt('high', T, null, T + neededIn * MINUTE)).toBe(T + minutes * MINUTE);
	});

	it.each([
		['high', 1],
		['medium', 5],
		['low', 30]
	] as const)('%s: the answer is waited for %i minutes', (grade, minutes) => {
		expect(goOnAfterMs(grade)).toBe(minutes * MINUTE);
	});
});

describe('isOpenTo', () => {
	const held = { state: 'taken', takenBy: 'nurse', holderAskedAt: null, nextStepAt: null } as const;
	it.each([
		['untaken', { ...held, state: 'raised', takenBy: null, nextStepAt: T }, true, true],
		['taken, its holder coming', held, false, false],
		['taken, its holder asked', { ...held, holderAskedAt: T }, false, false],
		['its holder did not come', { ...held, holderAskedAt: T, nextStepAt: T }, false, true],
		['made graver', { ...held, nextStepAt: T }, true, true],
		['settled', { ...held, state: 'settled' }, false, false]
	] as const)('%s: to the holder %s, to another %s', (_, facts, holder, other) => {
		expect([isOpenTo(facts, 'nurse'), isOpenTo(facts, 'nurse2')]).toEqual([holder, other]);
	});

	it('does not call an untaken one sought anew', () => {
		expect(isSoughtAnew({ state: 'raised', nextStepAt: T })).toBe(false);
	});
});

describe('etaOf', () => {
	it.each([
		[{ etaMinutes: null, etaGivenAt: null, takenAt: T }, null],
		[{ etaMinutes: 5, etaGivenAt: null, takenAt: T }, T + 5 * MINUTE],
		[{ etaMinutes: 5, etaGivenAt: T + MINUTE, takenAt: T }, T + 6 * MINUTE]
	])('%o', (held, expected) => {
		expect(etaOf(held)).toBe(expected);
	});
});
