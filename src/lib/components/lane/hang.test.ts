import { describe, expect, it } from 'vitest';
import { hang, hangingHeight, MOST_SHOWN, type Room } from './hang';

const room = (laid: number, width = 400): Room => ({ laid, width, axis: 24, floor: 36 });
const words = (count: number, letters = 20) => Array.from({ length: count }, () => letters);

describe('hang', () => {
	it.each([0, 1, 2, MOST_SHOWN, MOST_SHOWN + 1, 9])('%i ends: draws at most three', (count) => {
		expect(hang(words(count), room(200))).toHaveLength(Math.min(count, MOST_SHOWN));
	});

	it.each([34, 52, 240])('keeps every end right of the beginning of a rope of %i px', (laid) => {
		const hung = hang(words(3), room(laid));
		expect(Math.min(...hung.map(({ x }) => x))).toBeGreaterThan(10);
	});

	it('lets no strand cross the words of another: later ends hang further back and lower', () => {
		const [first, second, third] = hang(words(3), room(240));
		expect(first?.x).toBeGreaterThan(second?.x ?? 0);
		expect(second?.x).toBeGreaterThan(third?.x ?? 0);
		expect(second?.y).toBeGreaterThan(first?.y ?? 0);
		expect(third?.y).toBeGreaterThan(second?.y ?? 0);
	});

	it.each([20, 40, 50])('words of %i letters end before the lane does', (letters) => {
		for (const { x } of hang(words(3, letters), room(312, 362))) {
			expect(x + letters * 6.1).toBeLessThan(362);
		}
	});

	it('whose words stand elsewhere all end at one height', () => {
		expect(new Set(hang(words(3, 0), room(240)).map(({ y }) => y)).size).toBe(1);
	});

	it.each([0, 1, 2, 3])('with %i ends is tall enough for their words', (count) => {
		const lowest = Math.max(0, ...hang(words(count), room(200)).map(({ y }) => y));
		expect(40 + hangingHeight(count, true)).toBeGreaterThan(lowest);
	});

	it('has a line more for what is not shown', () => {
		expect(hangingHeight(4, true)).toBeGreaterThan(hangingHeight(3, true));
		expect(hangingHeight(9, true)).toBe(hangingHeight(4, true));
		expect(hangingHeight(9, false)).toBe(hangingHeight(1, false));
	});
});
