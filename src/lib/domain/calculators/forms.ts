/**
 * The bodies of `POST /api/calculate/...`. Nothing of them is stored. A value out of bounds, or one that a formula
 * cannot do without, is refused with a message that names field, value and limit.
 */
import { z } from 'zod';
import { SEXES } from '../core/codes';
import { BOUNDS } from '../bedside';
import { numberWithin, oneOf, shown, yesNo } from '../bedside/form-fields';
import { CALCULATOR_BOUNDS as OURS } from './bounds';
import { plain } from '../bedside/numbers';
import { MAXIMUM_METHODS, predictedMaximum } from './heart-rate-target';
import { MEANINGFUL_GROUPS } from './walk-test';

const FRACTIONS_MAX = 20;

/** Every value may be missing: the score then has no total and says what is missing. */
export const earlyWarningBody = z.object({
	rr: numberWithin('rr', BOUNDS.rr).nullish(),
	spo2: numberWithin('spo2', BOUNDS.spo2).nullish(),
	scale: z
		.literal([1, 2], { error: ({ input }) => `scale is ${shown(input)}: it must be 1 or 2.` })
		.nullish(),
	oxygen: yesNo('oxygen').nullish(),
	sbp: numberWithin('sbp', BOUNDS.sbp).nullish(),
	pulse: numberWithin('pulse', BOUNDS.hr).nullish(),
	consciousness: oneOf('consciousness', ['A', 'C', 'V', 'P', 'U']).nullish(),
	temperature: numberWithin('temperature', BOUNDS.temperature).nullish()
});
export type EarlyWarningInput = z.output<typeof earlyWarningBody>;

const speedMPerMin = numberWithin('speedMPerMin', OURS.speedMPerMin);
const grade = numberWithin('grade', OURS.grade).nullish();
const watts = numberWithin('watts', OURS.watts);
const weightKg = numberWithin('weightKg', OURS.weightKg);

/** Each kind of work with what its equation needs. `grade` left out is level ground; `watts` is mechanical. */
export const energyBody = z.discriminatedUnion(
	'mode',
	[
		z.object({ mode: z.literal('walk'), speedMPerMin, grade, weightKg: weightKg.nullish() }),
		z.object({ mode: z.literal('run'), speedMPerMin, grade, weightKg: weightKg.nullish() }),
		z.object({
			mode: z.literal('step'),
			stepsPerMin: numberWithin('stepsPerMin', OURS.stepsPerMin),
			stepHeightM: numberWithin('stepHeightM', OURS.stepHeightM),
			weightKg: weightKg.nullish()
		}),
		z.object({ mode: z.literal('leg-cycle'), watts, weightKg }),
		z.object({ mode: z.literal('arm-cycle'), watts, weightKg })
	],
	{
		error: ({ input }) =>
			typeof input === 'object' && input !== null
				? `mode is ${shown('mode' in input ? input.mode : undefined)}: it must be one of walk, run, step, leg-cycle, arm-cycle.`
				: `the body is ${shown(input)}: it must be an object.`
	}
);
export type EnergyInput = z.output<typeof energyBody>;

export const heartRateTargetBody = z
	.object({
		age: numberWithin('age', OURS.ageYears),
		resting: numberWithin('resting', BOUNDS.hr),
		method: oneOf('method', MAXIMUM_METHODS),
		fractions: z
			.array(numberWithin('a fraction', OURS.fraction), {
				error: ({ input }) => `fractions is ${shown(input)}: it must be a list of numbers from 0 to 1.`
			})
			.min(1, { error: 'fractions is empty: it must hold at least one number.' })
			.max(FRACTIONS_MAX, { error: `fractions is too long: it may hold at most ${FRACTIONS_MAX} numbers.` })
	})
	.superRefine(({ age, resting, method }, ctx) => {
		const maximum = predictedMaximum(method, age);
		if (resting >= maximum) {
			const message = `resting is ${resting}: it must lie below the maximum of ${plain(maximum)} that ${method} predicts.`;
			ctx.addIssue({ code: 'custom', path: ['resting'], message, input: resting });
		}
	});
export type HeartRateTargetInput = z.output<typeof heartRateTargetBody>;

export const walkTestBody = z.object({
	sex: oneOf('sex', SEXES),
	ageYears: numberWithin('ageYears', OURS.ageYears),
	heightCm: numberWithin('heightCm', OURS.heightCm),
	weightKg,
	distanceM: numberWithin('distanceM', OURS.walkedM).nullish()
});
export type WalkTestInput = z.output<typeof walkTestBody>;

export const pressuresBody = z
	.object({
		hr: numberWithin('hr', BOUNDS.hr),
		sbp: numberWithin('sbp', BOUNDS.sbp),
		dbp: numberWithin('dbp', BOUNDS.dbp)
	})
	.superRefine(({ sbp, dbp }, ctx) => {
		if (sbp <= dbp) {
			const message = `sbp is ${sbp} and dbp is ${dbp}: the systolic pressure must be above the diastolic.`;
			ctx.addIssue({ code: 'custom', path: ['sbp'], message, input: sbp });
		}
	});
export type PressuresInput = z.output<typeof pressuresBody>;

/** Counted laps of a corridor, there and back, and the part of a lap walked last. */
export const corridorBody = z.object({
	lengthM: numberWithin('lengthM', OURS.corridorM),
	laps: numberWithin('laps', OURS.laps),
	minutes: numberWithin('minutes', OURS.walkMinutes),
	extraM: numberWithin('extraM', OURS.corridorM).nullish()
});
export type CorridorInput = z.output<typeof corridorBody>;

/** Two walks of one patient, and the group whose smallest change that matters they are held against. */
export const walkChangeBody = z.object({
	beforeM: numberWithin('beforeM', OURS.walkedM),
	afterM: numberWithin('afterM', OURS.walkedM),
	against: oneOf('against', MEANINGFUL_GROUPS)
});
export type WalkChangeInput = z.output<typeof walkChangeBody>;
