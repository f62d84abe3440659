import { describe, expect, it } from 'vitest';
import { energy, walkingGradeFor, walkingSpeedFor } from './energy';
import type { EnergyInput } from './forms';

const MPH = 26.8;
const INCH = 0.0254;

/**
 * Computed from the published equations (ACSM Health and Fitness Journal 2020; step: topendsports.com). Three rows
 * also stand in print: 3.5 mph at 10 % is 29.76, 450 kg m/min at 62 kg about 20 (ACSM Metabolic Equations,
 * scribd.com/doc/316171074), 30 steps of 12 inches 31.4 (topendsports.com).
 */
const ROWS: [string, EnergyInput, number, number, boolean][] = [
	['walk 2.0 mph', { mode: 'walk', speedMPerMin: 2 * MPH }, 8.86, 2.531, true],
	['walk 2.5 mph', { mode: 'walk', speedMPerMin: 2.5 * MPH }, 10.2, 2.914, true],
	['walk 3.0 mph', { mode: 'walk', speedMPerMin: 3 * MPH }, 11.54, 3.297, true],
	['walk 3.0 mph, 2.5 %', { mode: 'walk', speedMPerMin: 3 * MPH, grade: 0.025 }, 15.158, 4.331, true],
	['walk 2.5 mph, 5 %', { mode: 'walk', speedMPerMin: 2.5 * MPH, grade: 0.05 }, 16.23, 4.637, true],
	['walk 1.7 mph, 10 %', { mode: 'walk', speedMPerMin: 1.7 * MPH, grade: 0.1 }, 16.257, 4.645, false],
	['walk 3.5 mph, 10 %', { mode: 'walk', speedMPerMin: 3.5 * MPH, grade: 0.1 }, 29.764, 8.504, true],
	['walk 1.5 mph', { mode: 'walk', speedMPerMin: 1.5 * MPH }, 7.52, 2.149, false],
	['walk 1.0 mph', { mode: 'walk', speedMPerMin: 1 * MPH }, 6.18, 1.766, false],
	['run 6.0 mph', { mode: 'run', speedMPerMin: 6 * MPH }, 35.66, 10.189, true],
	['run 6.0 mph, 1 %', { mode: 'run', speedMPerMin: 6 * MPH, grade: 0.01 }, 37.107, 10.602, true],
	['leg 50 W, 80 kg', { mode: 'leg-cycle', watts: 50, weightKg: 80 }, 13.75, 3.929, true],
	['leg 100 W, 70 kg', { mode: 'leg-cycle', watts: 100, weightKg: 70 }, 22.429, 6.408, true],
	['leg 450 kg m/min, 62 kg', { mode: 'leg-cycle', watts: 75, weightKg: 62 }, 20.065, 5.733, true],
	['arm 25 W, 75 kg', { mode: 'arm-cycle', watts: 25, weightKg: 75 }, 9.62, 2.749, true],
	['step 30/min, 12 in', { mode: 'step', stepsPerMin: 30, stepHeightM: 12 * INCH }, 31.391, 8.969, true],
	['step 20/min, 0.20 m', { mode: 'step', stepsPerMin: 20, stepHeightM: 0.2 }, 17.076, 4.879, true],
	['step 24/min, 7 in', { mode: 'step', stepsPerMin: 24, stepHeightM: 7 * INCH }, 18.516, 5.29, true]
];

describe('energy', () => {
	it.each(ROWS)('%s', (_what, input, vo2, mets, inRange) => {
		const found = energy(input);
		expect(Math.abs(found.vo2 - vo2)).toBeLessThan(0.001);
		expect(Math.abs(found.mets - mets)).toBeLessThan(0.001);
		expect(found.inRange).toBe(inRange);
	});

	it.each<[string, EnergyInput, boolean]>([
		['walk 49.9', { mode: 'walk', speedMPerMin: 49.9 }, false],
		['walk 50', { mode: 'walk', speedMPerMin: 50 }, true],
		['walk 100', { mode: 'walk', speedMPerMin: 100 }, true],
		['walk 100.1', { mode: 'walk', speedMPerMin: 100.1 }, false],
		['run 134', { mode: 'run', speedMPerMin: 134 }, false],
		['run 134.1', { mode: 'run', speedMPerMin: 134.1 }, true],
		['leg 49.9 W', { mode: 'leg-cycle', watts: 49.9, weightKg: 70 }, false],
		['leg 200 W', { mode: 'leg-cycle', watts: 200, weightKg: 70 }, true],
		['leg 200.1 W', { mode: 'leg-cycle', watts: 200.1, weightKg: 70 }, false],
		['arm 24.9 W', { mode: 'arm-cycle', watts: 24.9, weightKg: 70 }, false],
		['arm 125 W', { mode: 'arm-cycle', watts: 125, weightKg: 70 }, true],
		['arm 125.1 W', { mode: 'arm-cycle', watts: 125.1, weightKg: 70 }, false],
		['step 11.9/min', { mode: 'step', stepsPerMin: 11.9, stepHeightM: 0.2 }, false],
		['step 30/min, 0.40 m', { mode: 'step', stepsPerMin: 30, stepHeightM: 0.4 }, true],
		['step 0.41 m', { mode: 'step', stepsPerMin: 20, stepHeightM: 0.41 }, false],
		['step 0.03 m', { mode: 'step', stepsPerMin: 20, stepHeightM: 0.03 }, false]
	])('%s: in range %s', (_what, input, inRange) => {
		expect(energy(input).inRange).toBe(inRange);
	});

	// 3 METs at 70 kg and 4 METs at 80 kg: METs x 3.5 x kg / 200 (from memory).
	it.each([
		[70, 70, 3.675],
		[105, 80, 5.6]
	])('%d m/min at %d kg burns %d kcal/min', (speedMPerMin, weightKg, kcal) => {
		expect(energy({ mode: 'walk', speedMPerMin, weightKg }).kcalPerMin).toBeCloseTo(kcal, 9);
	});

	it('burns an unknown amount without a weight', () => {
		expect(energy({ mode: 'walk', speedMPerMin: 70 }).kcalPerMin).toBeNull();
	});
});

it('inverts the walking equation', () => {
	expect(walkingSpeedFor(3)).toBeCloseTo(70, 9);
	expect(walkingSpeedFor(2.5)).toBeCloseTo(52.5, 9);
	expect(walkingGradeFor(4, 2.5 * MPH)).toBeCloseTo(0.0315, 4);
});
