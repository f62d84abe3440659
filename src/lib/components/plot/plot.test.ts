import { describe, expect, it } from 'vitest';
import { inOrder, niceTicks, nextPoint, share, spread, valuesOf, type PlotSeries } from './plot';

describe('niceTicks', () => {
	it.each([
		{ values: [62, 118], ticks: [60, 80, 100, 120] },
		{ values: [90, 97], ticks: [90, 92, 94, 96, 98] },
		{ values: [7.25, 7.4], ticks: [7.25, 7.3, 7.35, 7.4] },
		{ values: [0, 0], ticks: [-0.5, 0, 0.5] },
		{ values: [100], ticks: [95, 100, 105] },
		{ values: [-12, 9], ticks: [-20, -10, 0, 10] },
		{ values: [], ticks: [0, 0.5, 1] }
	])('$values stand among $ticks', ({ values, ticks }) => {
		expect(niceTicks(values)).toEqual(ticks);
	});

	it.each([[[1, 2]], [[0.1, 0.7]], [[70, 73]], [[40, 250]]])('%s lie inside their ticks', (values) => {
		const ticks = niceTicks(values);
		expect(ticks[0]).toBeLessThanOrEqual(Math.min(...values));
		expect(ticks.at(-1)).toBeGreaterThanOrEqual(Math.max(...values));
	});
});

describe('share', () => {
	it.each([
		[60, 0],
		[90, 0.5],
		[120, 1]
	])('%d of 60 to 120 is %d', (value, expected) => {
		expect(share(value, { from: 60, to: 120 })).toBe(expected);
	});

	it('puts a lonely value in the middle', () => {
		expect(share(5, { from: 5, to: 5 })).toBe(0.5);
	});
});

describe('spread', () => {
	it('leaves labels where they belong when there is room', () => {
		expect(spread([10, 60, 100], 16, 160)).toEqual([10, 60, 100]);
	});

	it('moves labels apart and keeps them inside', () => {
		expect(spread([100, 104, 108], 16, 120)).toEqual([88, 104, 120]);
		expect(spread([0, 0], 16, 120)).toEqual([0, 16]);
	});
});

const series: PlotSeries[] = [
	{
		key: 'systolic',
		label: 'Systolic',
		mark: 'disc',
		runs: [
			[
				{ x: 0, y: 128, moment: 'before' },
				{ x: 2, y: 108, moment: 'after', verdict: 'stop' }
			]
		]
	},
	{ key: 'diastolic', label: 'Diastolic', mark: 'ring', runs: [[{ x: 0, y: 76, moment: 'before' }]] }
];

describe('reading a plot', () => {
	it('has room for every value and every limit', () => {
		expect(valuesOf(series, [{ from: 0, to: 2, y: 118, label: 'stop' }])).toEqual([128, 108, 76, 118]);
	});

	it('visits the points by time', () => {
		expect(inOrder(series).map(({ series: { key }, point: { x } }) => `${key} ${x}`)).toEqual([
			'systolic 0',
			'diastolic 0',
			'systolic 2'
		]);
	});

	it.each([
		['ArrowRight', 0, 1],
		['ArrowRight', 2, 2],
		['ArrowLeft', 0, 0],
		['ArrowLeft', 2, 1],
		['Home', 2, 0],
		['End', 0, 2],
		['Enter', 1, null]
	])('%s from %d leads to %s', (key, from, to) => {
		expect(nextPoint(from, key, 3)).toBe(to);
	});
});
