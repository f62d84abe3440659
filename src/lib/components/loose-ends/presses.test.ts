import { describe, expect, it } from 'vitest';
import { targetOf } from './row-keys';
import { isTooSoon } from './steady-presses';

describe('targetOf', () => {
	it.each([
		['ArrowDown', 0, 1],
		['ArrowDown', 2, null],
		['ArrowUp', 2, 1],
		['ArrowUp', 0, null],
		['Home', 2, 0],
		['End', 0, 2],
		['Tab', 1, null],
		['j', 1, null]
	])('%s in row %d of three leads to %s', (key, at, target) => {
		expect(targetOf(key, at, 3)).toBe(target);
	});
});

describe('isTooSoon', () => {
	it.each([
		['a finger, 399 ms after rows moved', 1, 1399, true],
		['a finger, 400 ms after rows moved', 1, 1400, false],
		['the keyboard, at once', 0, 1000, false]
	])('%s', (_, detail, timeStamp, soon) => {
		expect(isTooSoon({ detail, timeStamp }, 1000)).toBe(soon);
	});

	it('counts where rows have never moved', () => {
		expect(isTooSoon({ detail: 1, timeStamp: 5 }, -Infinity)).toBe(false);
	});
});
