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

	it('hangs the first one where the rope ends', () => {
		expect(hang(words(1), room(240))[0]?.d).toMatch(/^M225 /);
		expect(hang(words(1, 0), room(34))[0]?.d).toMatch(/^M19 /);
	});

	it('with room on the right lets later ends hang further back and lower, across no words', () => {
		const [first, second, third] = hang(words(3), room(240));
		expect(first?.anchor).toBe('start');
		expect(first?.x).toBeGreaterThan(second?.x ?? 0);
		expect(second?.x).toBeGreaterThan(third?.x ?? 0);
		expect(second?.y).toBeGreaterThan(first?.y ?? 0);
		expect(third?.y).toBeGreaterThan(second?.y ?? 0);
	});

	it('without it puts words on the left, and later ends further along', () => {
		const [first, second, third] = hang(words(3), room(312, 362));
		expect(first?.anchor).toBe('end');
		expect(first?.x).toBeLessThan(second?.x ?? 0);
		expect(second?.x).toBeLessThan(third?.x ?? 0);
		expect(second?.y).toBeGreaterThan(first?.y ?? 0);
		expect(third?.d).toMatch(/^M297 /);
	});

	it.each([20, 40, 50])(
		'words of %i letters stand within the lane, as long as it has the room',
		(letters) => {
			for (const laid of [52, 104, 156, 208, 260, 312]) {
				for (const { x, anchor } of hang(words(3, letters), room(laid, 362))) {
					const [from, to] = anchor === 'start' ? [x, x + letters * 6.1] : [x - letters * 6.1, x];
					expect([from >= 0, to < 362]).toEqual([true, true]);
				}
			}
		}
	);

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
