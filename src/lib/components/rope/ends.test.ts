import { describe, expect, it } from 'vitest';
import { answeredWay, frayedEnd, openWay } from './ends';

const numbers = (d: string) => (d.match(/-?[\d.]+/g) ?? []).map(Number);

describe('answeredWay', () => {
	it.each([
		[100, 118],
		[100, 240],
		[0, 4000]
	])('leaves the axis at %d and comes back to it at %d', (from, to) => {
		const points = numbers(answeredWay(from, to));
		expect(points.slice(0, 2)).toEqual([0, from]);
		expect(points.slice(-2)).toEqual([0, to]);
	});

	it('bends out equally far, however long the answer took', () => {
		expect(Math.max(...numbers(answeredWay(0, 40)).filter((_, at) => at % 2 === 0))).toBe(56);
		expect(Math.max(...numbers(answeredWay(0, 4000)).filter((_, at) => at % 2 === 0))).toBe(56);
	});
});

describe('openWay', () => {
	it('starts at the axis and ends where its hairs begin', () => {
		const { d, hairs } = openWay(300);
		expect(numbers(d).slice(0, 2)).toEqual([0, 300]);
		expect(numbers(d).slice(-2)).toEqual(numbers(hairs).slice(0, 2));
	});
});

describe('frayedEnd', () => {
	it('spreads four hairs, none longer than asked for', () => {
		const hairs = frayedEnd({ x: 10, s: 20 }, 0, 12).match(/M[^M]+/g) ?? [];
		expect(hairs).toHaveLength(4);
		for (const hair of hairs) {
			const [x0, s0, x1, s1] = numbers(hair) as [number, number, number, number];
			expect(Math.hypot(x1 - x0, s1 - s0)).toBeLessThanOrEqual(12.1);
		}
	});
});
