/**
 * Energy demand by the metabolic equations of the American College of Sports Medicine: gross oxygen uptake in
 * mL/kg/min at steady state, and METs as its multiple of 3.5. They estimate for healthy adults within a range of
 * speed or power; outside it the number is still given and marked, because hiding it helps nobody. Holding on to
 * handrails lowers the true demand.
 *
 * Walk, run and leg cycle: ACSM Health and Fitness Journal 2020, metabolic calculations. Step:
 * topendsports.com/testing/equation-acsm-stepping. Arm cycle and the ranges of run, arm cycle and step: from
 * memory. The leg equation is written for work in kg m/min; with watts its factor is 10.8 (1 W taken as 6 kg m/min).
 */
import type { EnergyInput } from './forms';

export interface Energy {
	/** Gross oxygen uptake, mL/kg/min. */
	readonly vo2: number;
	readonly mets: number;
	/** False where the equation was not made for this speed or power. */
	readonly inRange: boolean;
	/** kcal/min; null where no weight is given. */
	readonly kcalPerMin: number | null;
}

/** Oxygen uptake of one MET, mL/kg/min. */
export const ML_PER_MET = 3.5;
const CYCLE_REST = 7;

/** The ranges the equations were made for, both ends included; running starts beyond its lower end. */
export const ENERGY_RANGES = {
	walk: { from: 50, to: 100, unit: 'm/min' },
	run: { from: 134, to: Infinity, unit: 'm/min' },
	step: { from: 12, to: 30, unit: 'steps/min' },
	stepHeight: { from: 0.04, to: 0.4, unit: 'm' },
	'leg-cycle': { from: 50, to: 200, unit: 'W' },
	'arm-cycle': { from: 25, to: 125, unit: 'W' }
} as const;

/** Estimate the energy demand of steady work. */
export function energy(input: EnergyInput): Energy {
	const vo2 = uptake(input);
	const mets = vo2 / ML_PER_MET;
	const kcalPerMin = input.weightKg == null ? null : (mets * ML_PER_MET * input.weightKg) / 200;
	return { vo2, mets, inRange: isInRange(input), kcalPerMin };
}

/** The speed on the level that asks for this many METs by the walking equation, m/min. */
export function walkingSpeedFor(mets: number): number {
	return (mets * ML_PER_MET - ML_PER_MET) / 0.1;
}

/** The grade, as a fraction, at which walking at this speed asks for this many METs. */
export function walkingGradeFor(mets: number, speedMPerMin: number): number {
	return (mets * ML_PER_MET - ML_PER_MET - 0.1 * speedMPerMin) / (1.8 * speedMPerMin);
}

function uptake(input: EnergyInput): number {
	switch (input.mode) {
		case 'walk':
			return ML_PER_MET + 0.1 * input.speedMPerMin + 1.8 * input.speedMPerMin * (input.grade ?? 0);
		case 'run':
			return ML_PER_MET + 0.2 * input.speedMPerMin + 0.9 * input.speedMPerMin * (input.grade ?? 0);
		case 'step':
			return ML_PER_MET + 0.2 * input.stepsPerMin + 1.33 * 1.8 * input.stepHeightM * input.stepsPerMin;
		case 'leg-cycle':
			return CYCLE_REST + (10.8 * input.watts) / input.weightKg;
		case 'arm-cycle':
			return ML_PER_MET + (18.36 * input.watts) / input.weightKg;
	}
}

function isInRange(input: EnergyInput): boolean {
	switch (input.mode) {
		case 'walk':
			return within(ENERGY_RANGES.walk, input.speedMPerMin);
		case 'run':
			return input.speedMPerMin > ENERGY_RANGES.run.from;
		case 'step':
			return (
				within(ENERGY_RANGES.step, input.stepsPerMin) && within(ENERGY_RANGES.stepHeight, input.stepHeightM)
			);
		case 'leg-cycle':
		case 'arm-cycle':
			return within(ENERGY_RANGES[input.mode], input.watts);
	}
}

function within({ from, to }: { from: number; to: number }, value: number): boolean {
	return value >= from && value <= to;
}
