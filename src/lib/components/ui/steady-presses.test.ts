import { describe, expect, it } from 'vitest';
import { isTooSoon } from './steady-presses';

describe('isTooSoon', () => {
	it.each([
		['a finger, 399 ms after buttons moved', 1, 1399, true],
		['a finger, 400 ms after buttons moved', 1, 1400, false],
		['the keyboard, at once', 0, 1000, false]
	])('%s', (_, detail, timeStamp, soon) => {
		expect(isTooSoon({ detail, timeStamp }, 1000)).toBe(soon);
	});

	it('counts where buttons have never moved', () => {
		expect(isTooSoon({ detail: 1, timeStamp: 5 }, -Infinity)).toBe(false);
	});
});
