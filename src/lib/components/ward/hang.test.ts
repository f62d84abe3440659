import { describe, expect, it } from 'vitest';
import { hang, hangingHeight, MOST_SHOWN } from './hang';

describe('hang', () => {
	it.each([0, 1, 2, MOST_SHOWN, MOST_SHOWN + 1, 9])('%i ends: draws at most three', (count) => {
		expect(hang(count, 200, 0.5, 24, 36)).toHaveLength(Math.min(count, MOST_SHOWN));
	});

	it.each([28, 40, 240])('keeps every end right of the beginning of a rope of %i px', (laid) => {
		const hung = hang(3, laid, 0.25, 24, 36);
		expect(Math.min(...hung.map(({ x }) => x))).toBeGreaterThan(10);
	});

	it('lets no strand cross the words of another: later ends hang further back and lower', () => {
		const [first, second, third] = hang(3, 240, 0.5, 24, 36);
		expect(first?.x).toBeGreaterThan(second?.x ?? 0);
		expect(second?.x).toBeGreaterThan(third?.x ?? 0);
		expect(second?.y).toBeGreaterThan(first?.y ?? 0);
		expect(third?.y).toBeGreaterThan(second?.y ?? 0);
	});

	it.each([0, 1, 2, 3])('with %i ends is tall enough for their words', (count) => {
		const lowest = Math.max(0, ...hang(count, 200, 0.5, 24, 36).map(({ y }) => y));
		expect(40 + hangingHeight(count)).toBeGreaterThan(lowest);
	});

	it('has a line more for what is not shown', () => {
		expect(hangingHeight(4)).toBeGreaterThan(hangingHeight(3));
		expect(hangingHeight(9)).toBe(hangingHeight(4));
	});
});
