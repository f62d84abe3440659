import { describe, expect, it } from 'vitest';
import {
	heartFailureMaximum,
	heartRateTarget,
	inpatientCeiling,
	predictedMaximum,
	reservePercent,
	type MaximumMethod
} from './heart-rate-target';

const FRACTIONS = [0.4, 0.5, 0.6, 0.7, 0.8];

describe('heartRateTarget', () => {
	/** Computed by heart-rate reserve from the three published maxima (Zhu 2010, Brawner 2004, 220-age). */
	it.each<[number, number, MaximumMethod, number, number[]]>([
		[65, 72, '220-age', 155, [105.2, 113.5, 121.8, 130.1, 138.4]],
		[65, 72, '208-0.7age', 162.5, [108.2, 117.25, 126.3, 135.35, 144.4]],
		[65, 62, '164-0.7age', 118.5, [84.6, 90.25, 95.9, 101.55, 107.2]],
		[58, 80, '220-age', 162, [112.8, 121, 129.2, 137.4, 145.6]],
		[74, 68, '164-0.7age', 112.2, [85.68, 90.1, 94.52, 98.94, 103.36]]
	])('age %d, rest %d, %s', (age, resting, method, maximum, targets) => {
		const found = heartRateTarget({ age, resting, method, fractions: FRACTIONS });
		expect(found.maximum).toBeCloseTo(maximum, 9);
		expect(found.targets).toHaveLength(targets.length);
		targets.forEach((target, index) => expect(found.targets[index]).toBeCloseTo(target, 9));
		expect(found.method).toBe(method);
	});

	it('gives the published example: age 20, rest 75, 70 % is 162.5', () => {
		const { targets } = heartRateTarget({ age: 20, resting: 75, method: '220-age', fractions: [0.7] });
		expect(targets[0]).toBeCloseTo(162.5, 9);
	});

	it('runs from the resting rate to the maximum', () => {
		const { targets } = heartRateTarget({ age: 60, resting: 70, method: '220-age', fractions: [0, 1] });
		expect(targets).toEqual([70, 160]);
	});

	it.each<[MaximumMethod, number, boolean]>([
		['164-0.7age', 39, false],
		['164-0.7age', 40, true],
		['164-0.7age', 80, true],
		['164-0.7age', 81, false],
		['220-age', 90, true],
		['208-0.7age', 20, true]
	])('%s at %d years: in range %s', (method, age, inRange) => {
		expect(heartRateTarget({ age, resting: 60, method, fractions: [0.5] }).inRange).toBe(inRange);
	});
});

describe('reservePercent', () => {
	it.each([
		// academic.whitworth.edu: age 20, from 50 to 150 of a maximum of 200 is 66.7 %.
		[150, 50, 200, 66.667],
		[100, 72, 155, 33.735]
	])('%d from %d with a maximum of %d is %d %%', (hr, resting, maximum, percent) => {
		expect(reservePercent(hr, resting, maximum)).toBeCloseTo(percent, 2);
	});
});

it('predicts maxima that differ by method', () => {
	expect(predictedMaximum('208-0.7age', 65) - predictedMaximum('164-0.7age', 65)).toBeCloseTo(44, 9);
});

// Heart failure on a beta-blocker: Keteyian 2012 (PubMed 21900844), computed.
it.each([
	[65, 70, 'treadmill', 121.5],
	[65, 70, 'cycle', 116.5]
] as const)('heart failure, age %d, rest %d, %s: %d', (age, resting, mode, expected) => {
	expect(heartFailureMaximum(age, resting, mode)).toBe(expected);
});

// Rest and thirty, capped at 130 (stop) or 120 (target): inpatient line of the ACSM, secondary source; computed.
it.each([
	[84, 130, 114],
	[104, 130, 130],
	[104, 120, 120],
	[100, 130, 130],
	[99.9, 130, 129.9]
])('rest %d under a cap of %d: %d', (resting, cap, expected) => {
	expect(inpatientCeiling(resting, cap)).toBe(expected);
});
