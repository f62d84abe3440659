/** Energy by the ACSM equations, laps of a corridor, and target heart rates. */
import {
	corridorWalk,
	energy,
	ENERGY_RANGES,
	heartRateTarget,
	METHODS,
	MAXIMUM_METHODS
} from '$lib/domain/calculators';
import {
	corridorBody,
	energyBody,
	heartRateTargetBody,
	type EnergyInput
} from '$lib/domain/calculators/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { figure, numbersOf, workOut, type CalculatorField, type CalculatorSpec, type Typed } from './spec';

const SPEED = { name: 'speedMPerMin', label: m.calculators_speed(), unit: 'm/min' };
const GRADE = { name: 'gradePercent', label: m.calculators_grade(), unit: '%' };
const WATTS = { name: 'watts', label: m.calculators_watts(), unit: 'W' };
const WEIGHT = { name: 'weightKg', label: m.calculators_weight(), unit: 'kg' };

const ENERGY_FIELDS: Record<string, readonly CalculatorField[]> = {
	walk: [SPEED, GRADE, WEIGHT],
	run: [SPEED, GRADE, WEIGHT],
	step: [
		{ name: 'stepsPerMin', label: m.calculators_steps(), unit: '/min' },
		{ name: 'stepHeightM', label: m.calculators_step_height(), unit: 'm' },
		WEIGHT
	],
	'leg-cycle': [WATTS, WEIGHT],
	'arm-cycle': [WATTS, WEIGHT]
};
const MODES = [
	{ value: 'walk', label: m.calculators_mode_walk() },
	{ value: 'run', label: m.calculators_mode_run() },
	{ value: 'step', label: m.calculators_mode_step() },
	{ value: 'leg-cycle', label: m.calculators_mode_leg() },
	{ value: 'arm-cycle', label: m.calculators_mode_arm() }
];

export const energySpec: CalculatorSpec = {
	id: 'energy',
	title: m.calculators_energy(),
	cautions: [m.calculators_energy_caution()],
	fields: ({ mode = 'walk' }) => [
		{ name: 'mode', label: m.calculators_mode(), options: MODES, initial: 'walk' },
		...(ENERGY_FIELDS[mode] ?? [])
	],
	work: (typed) => {
		const mode = typed.mode ?? 'walk';
		return workOut(energyBody, energyBodyOf(mode, typed), (input) => {
			const { vo2, mets, inRange, kcalPerMin } = energy(input);
			return {
				head: m.calculators_mets({ value: figure(mets, 1) }),
				lines: [
					{ label: m.calculators_oxygen_uptake(), value: `${figure(vo2, 1)} mL/kg/min` },
					...(kcalPerMin === null
						? []
						: [{ label: m.calculators_kcal(), value: `${figure(kcalPerMin, 1)} kcal/min` }])
				],
				notes: [
					inRange ? m.calculators_in_range() : m.calculators_out_of_range(),
					m.calculators_made_for({ range: rangeWords(input.mode) })
				]
			};
		});
	}
};

/** The work that the equation was made for, in words. */
function rangeWords(mode: EnergyInput['mode']): string {
	const { from, to, unit } = ENERGY_RANGES[mode];
	const rate = to === Infinity ? m.calculators_over({ from, unit }) : m.calculators_span({ from, to, unit });
	const { stepHeight } = ENERGY_RANGES;
	return mode === 'step' ? `${rate}, ${m.calculators_span(stepHeight)}` : rate;
}

/** The fields of the kind of work alone, the slope as the fraction that the API takes. */
function energyBodyOf(mode: string, typed: Typed): Record<string, unknown> {
	const names = (ENERGY_FIELDS[mode] ?? []).map(({ name }) => name);
	const numbers = numbersOf(Object.fromEntries(names.map((name) => [name, typed[name] ?? ''])));
	const { gradePercent, ...rest } = numbers;
	if (gradePercent === undefined) {
		return { mode, ...rest };
	}
	return { mode, ...rest, grade: typeof gradePercent === 'number' ? gradePercent / 100 : gradePercent };
}

export const corridorSpec: CalculatorSpec = {
	id: 'corridor',
	title: m.calculators_corridor(),
	cautions: [m.calculators_corridor_caution()],
	fields: () => [
		{ name: 'lengthM', label: m.calculators_corridor_length(), unit: 'm', initial: '50' },
		{ name: 'laps', label: m.calculators_laps() },
		{ name: 'extraM', label: m.calculators_extra(), unit: 'm' },
		{ name: 'minutes', label: m.calculators_minutes(), unit: 'min' }
	],
	work: (typed) =>
		workOut(corridorBody, numbersOf(typed), ({ lengthM, laps, minutes, extraM }) => {
			const walk = corridorWalk(lengthM, laps, minutes * 60, extraM ?? 0);
			return {
				head: m.calculators_distance({ value: figure(walk.distanceM, 0) }),
				lines: [
					{
						label: m.calculators_speed(),
						value: walk.speedMPerMin === null ? '' : `${figure(walk.speedMPerMin, 1)} m/min`
					},
					{
						label: m.calculators_estimated(),
						value: walk.mets === null ? '' : `${figure(walk.mets, 1)} METs`
					}
				],
				notes: [walk.inRange ? m.calculators_in_range() : m.calculators_out_of_range()]
			};
		})
};

const PER_CENT = [40, 50, 60, 70, 80];
const METHOD_OPTIONS = MAXIMUM_METHODS.map((value) => ({ value, label: value }));

export const heartRateSpec: CalculatorSpec = {
	id: 'heart-rate-target',
	title: m.calculators_target(),
	cautions: [m.calculators_target_caution()],
	fields: () => [
		{ name: 'age', label: m.calculators_age(), unit: m.calculators_years() },
		{ name: 'resting', label: m.calculators_resting(), unit: '/min' },
		{ name: 'method', label: m.calculators_method(), options: METHOD_OPTIONS, initial: '220-age' }
	],
	work: (typed) => {
		const body = {
			...numbersOf(typed),
			method: typed.method ?? '220-age',
			fractions: PER_CENT.map((each) => each / 100)
		};
		return workOut(heartRateTargetBody, body, (input) => {
			const { maximum, targets, method, inRange } = heartRateTarget(input);
			return {
				head: m.calculators_maximum({ value: figure(maximum, 0), method }),
				lines: PER_CENT.map((each, index) => ({
					label: m.calculators_of_reserve({ percent: each }),
					value: `${figure(targets[index] ?? 0, 0)} /min`
				})),
				notes: [METHODS[method].words, ...(inRange ? [] : [m.calculators_age_out_of_range()])]
			};
		});
	}
};
