import { describe, expect, it } from 'vitest';
import { walkChange, walkTest } from './walk-test';

/** Computed from the equations in the European Respiratory Journal; lower limits from memory (Enright and Sherrill 1998). */
const ROWS = [
	['male', 172, 65, 80, 525.94, 372.94],
	['male', 180, 55, 90, 619.1, 466.1],
	['male', 165, 78, 70, 425.29, 272.29],
	['female', 160, 70, 68, 444.28, 305.28],
	['female', 165, 60, 75, 496.6, 357.6],
	['female', 152, 80, 55, 399.37, 260.37]
] as const;

describe('walkTest', () => {
	it.each(ROWS)('%s, %d cm, %d years, %d kg', (sex, heightCm, ageYears, weightKg, predicted, lowerLimit) => {
		const found = walkTest({ sex, heightCm, ageYears, weightKg });
		expect(found.predictedM).toBeCloseTo(predicted, 9);
		expect(found.lowerLimitM).toBeCloseTo(lowerLimit, 9);
		expect(found).toMatchObject({ percent: null, belowLowerLimit: null, inRange: true });
	});

	it.each([
		['male', 172, 65, 80, 400, 76.05, false],
		// Exactly the limit is not below it, though a sum of tenths would put it there: 372.94, and 372.93 under it.
		['male', 172, 65, 80, 372.94, 70.91, false],
		['male', 172, 65, 80, 372.93, 70.91, true],
		['female', 160, 70, 68, 310, 69.78, false],
		['female', 160, 70, 68, 300, 67.52, true]
	] as const)(
		'%s, %d cm, %d years, %d kg walks %d m',
		(sex, heightCm, ageYears, weightKg, distanceM, percent, below) => {
			const found = walkTest({ sex, heightCm, ageYears, weightKg, distanceM });
			expect(found.percent).toBeCloseTo(percent, 2);
			expect(found.belowLowerLimit).toBe(below);
		}
	);

	it.each([
		[39, false],
		[40, true],
		[80, true],
		[81, false]
	])('at %d years in range is %s', (ageYears, inRange) => {
		expect(walkTest({ sex: 'male', heightCm: 175, ageYears, weightKg: 80 }).inRange).toBe(inRange);
	});

	it.each(['other', 'unknown'] as const)('has no equation for %s, and makes none up', (sex) => {
		expect(walkTest({ sex, heightCm: 170, ageYears: 60, weightKg: 70, distanceM: 400 })).toEqual({
			predictedM: null,
			lowerLimitM: null,
			percent: null,
			belowLowerLimit: null,
			inRange: false
		});
	});

	it('gives no share of a prediction that is not above nothing', () => {
		const found = walkTest({ sex: 'male', heightCm: 120, ageYears: 110, weightKg: 200, distanceM: 50 });
		expect(found.predictedM).toBeLessThan(0);
		expect(found.percent).toBeNull();
	});
});

describe('walkChange', () => {
	// 25 m in coronary disease: Gremeaux 2011.
	it.each([
		[24, false],
		[24.9, false],
		[25, true],
		[26, true],
		[-26, true]
	])('a change of %d m matters: %s', (change, matters) => {
		expect(walkChange(400, 400 + change)).toMatchObject({ matters, thresholdM: 25 });
	});

	// Pooled 23 m: Daynes 2025 (published). 30 m: ERS and ATS, from memory. 36 m in heart failure: PubMed 25049008 (published).
	it.each([
		['coronary', 25],
		['cardiac-pooled', 23],
		['respiratory', 30],
		['heart-failure', 36]
	] as const)('against %s it matters from %d m on', (group, thresholdM) => {
		const matters = [thresholdM - 0.1, thresholdM, thresholdM + 0.1].map(
			(change) => walkChange(400, 400 + change, group).matters
		);
		expect(matters).toEqual([false, true, true]);
		expect(walkChange(400, 400, group).thresholdM).toBe(thresholdM);
	});

	it('is freed of the noise of binary fractions before it is judged', () => {
		// 512.3 - 487.3 is 24.999999999999943 in binary: 25 m on paper, which matters.
		expect(walkChange(487.3, 512.3)).toEqual({ changeM: 25, matters: true, thresholdM: 25 });
	});

	it('may be held against another group', () => {
		expect(walkChange(300, 330, 'heart-failure')).toEqual({ changeM: 30, matters: false, thresholdM: 36 });
	});
});
