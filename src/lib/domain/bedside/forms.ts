/**
 * The shapes a session comes in, for `POST /api/assess`, `POST /api/episodes/:id/sessions` and the bedside page.
 * A value outside its hard bounds (`bounds.ts`), or a systolic not above its diastolic, is refused with a
 * message that names field, value and limit. Everything merely doubtful is accepted: the page asks about it.
 *
 * A missing value may be left out or sent as null; both mean 'not measured', never 'normal'.
 *
 * This module is the only one of the area that loads zod. Pages that only judge import from `index.ts`.
 */
import { z } from 'zod';
import { CLEARANCE_KINDS, CLEARANCE_STATES, RHYTHMS } from '../core/codes';
import { ACTIVITY_CODES } from './activities/codes';
import { AIRWAYS, ASSISTANCE, LIMIT_KEYS, PHASES, POSTURES, PRESSURE_SOURCES, SETS, SYMPTOMS } from './codes';
import { bounded, instant, levelSchema, oneOf, shown, text, wordOrObject, yesNo } from './form-fields';

const TEXT_MAX = 2000;
const NAME_MAX = 200;
const LIST_MAX = 200;

/**
 * One set of readings. `work` is any number that grows with effort (watts, stage, metres per minute) and orders
 * the `during` readings. `settled` marks a reading taken once the patient has come to rest in a new posture.
 */
export const readingSchema = z
	.object({
		at: instant('at').nullish(),
		posture: oneOf('posture', POSTURES).nullish(),
		settled: yesNo('settled').nullish(),
		work: z
			.number({
				error: ({ input }) => `work is ${shown(input)}: it must be a number that grows with effort.`
			})
			.nullish(),
		bpSource: oneOf('bpSource', PRESSURE_SOURCES).nullish(),
		rhythm: oneOf('rhythm', RHYTHMS).nullish(),
		hr: bounded('hr').nullish(),
		sbp: bounded('sbp').nullish(),
		dbp: bounded('dbp').nullish(),
		spo2: bounded('spo2').nullish(),
		rr: bounded('rr').nullish(),
		rpe: bounded('rpe').nullish(),
		pain: bounded('pain').nullish(),
		oxygenLpm: bounded('oxygenLpm').nullish()
	})
	.superRefine(({ sbp, dbp }, ctx) => {
		if (sbp != null && dbp != null && sbp <= dbp) {
			const message = `sbp is ${sbp} and dbp is ${dbp}: the systolic pressure must be above the diastolic.`;
			ctx.addIssue({ code: 'custom', path: ['sbp'], message, input: sbp });
		}
	});
export type Reading = z.output<typeof readingSchema>;

const clearanceLimitsSchema = z.object({
	maxElevationDeg: bounded('elevationDeg', 'maxElevationDeg').nullish(),
	maxLoadKg: bounded('loadKg', 'maxLoadKg').nullish()
});
export type ClearanceLimits = z.output<typeof clearanceLimitsSchema>;

/**
 * A clearance in force: the bare kind, or the kind with its limits, beside it or in `limits` as the clearance
 * itself carries them. With a `state` other than given or given-with-limits it counts as not in force, so that
 * a list of all clearances of an episode can be sent as it is.
 */
export const clearanceInForceSchema = z.union(
	[
		z.enum(CLEARANCE_KINDS),
		clearanceLimitsSchema.extend({
			kind: oneOf('clearance', CLEARANCE_KINDS),
			state: oneOf('state', CLEARANCE_STATES).nullish(),
			limits: clearanceLimitsSchema.nullish()
		})
	],
	{ error: wordOrObject('clearance', CLEARANCE_KINDS, '{ kind, maxElevationDeg?, maxLoadKg? }') }
);
export type ClearanceInForce = z.output<typeof clearanceInForceSchema>;

/** Above every limit there is, so that an override cannot switch a rule off by being absurd. */
const LIMIT_MAX = 300;

function limitError({ input }: { input?: unknown }): string {
	return `a limit is ${shown(input)}: it must be a number from 0 to ${LIMIT_MAX}.`;
}

/**
 * Limits for this patient alone: any number of `LIMIT_KEYS`, where the bare name of a rule is its stop limit,
 * and `maxElevationDeg` or `maxLoadKg` for arms that are cleared. A stored session takes its limits from the
 * record, not from here.
 */
export const limitsOverrideSchema = z.partialRecord(
	z.enum([...LIMIT_KEYS, 'maxElevationDeg', 'maxLoadKg']),
	z.number({ error: limitError }).min(0, { error: limitError }).max(LIMIT_MAX, { error: limitError }),
	{
		error: (issue) =>
			'keys' in issue && Array.isArray(issue.keys)
				? `limits names ${issue.keys.join(', ')}, which is no limit of the response rules.`
				: undefined
	}
);
export type LimitsOverride = z.output<typeof limitsOverrideSchema>;

/** The range the programme prescribes for an outpatient; any end may be open. */
export const prescribedSchema = z
	.object({
		hrMin: bounded('hr', 'hrMin').nullish(),
		hrMax: bounded('hr', 'hrMax').nullish(),
		rpeMin: bounded('rpe', 'rpeMin').nullish(),
		rpeMax: bounded('rpe', 'rpeMax').nullish()
	})
	.superRefine((range, ctx) => {
		for (const [low, high] of [
			['hrMin', 'hrMax'],
			['rpeMin', 'rpeMax']
		] as const) {
			const [from, to] = [range[low], range[high]];
			if (from != null && to != null && from > to) {
				const message = `${low} is ${from} and ${high} is ${to}: the range must not end below its start.`;
				ctx.addIssue({ code: 'custom', path: [low], message, input: from });
			}
		}
	});
export type Prescribed = z.output<typeof prescribedSchema>;

/**
 * What has to be known about the patient to judge a reading. Only `betaBlocked`, `rhythm`, `sternotomy`,
 * `level` and `conscious` must be given. `betaBlocked` means any rate-slowing drug; null is 'not known' and is
 * judged as true. `clearances` left out means that none is known to be in force.
 */
export const contextSchema = z.object({
	set: oneOf('set', SETS).nullish(),
	phase: oneOf('phase', PHASES).nullish(),
	betaBlocked: z
		.boolean({
			error: ({ input }) =>
				`betaBlocked is ${shown(input)}: it must be true, false, or null when it is not known.`
		})
		.nullable(),
	rhythm: oneOf('rhythm', RHYTHMS),
	sternotomy: yesNo('sternotomy'),
	level: levelSchema,
	conscious: yesNo('conscious'),
	followsCommands: yesNo('followsCommands').nullish(),
	airway: oneOf('airway', AIRWAYS).nullish(),
	vasopressorRising: yesNo('vasopressorRising').nullish(),
	balloonPump: yesNo('balloonPump').nullish(),
	pacingDependent: yesNo('pacingDependent').nullish(),
	bleeding: yesNo('bleeding').nullish(),
	temperature: bounded('temperature').nullish(),
	clearances: z.array(clearanceInForceSchema).max(LIST_MAX).nullish(),
	limits: limitsOverrideSchema.nullish(),
	prescribed: prescribedSchema.nullish()
});
export type Context = z.output<typeof contextSchema>;

const gradedSymptomSchema = z.object({
	code: oneOf('symptom', SYMPTOMS),
	grade: bounded('symptomGrade', 'grade').nullish()
});

/** A symptom: the word, or the word with a grade from 1 (just noticed) to 4 (cannot go on). */
export const symptomSchema = z.union([z.enum(SYMPTOMS), gradedSymptomSchema], {
	error: wordOrObject('symptom', SYMPTOMS, '{ code, grade } with a grade from 1 to 4')
});
export type Symptom = z.output<typeof symptomSchema>;

/** One thing done, or planned and not done. `helper` is whoever stood by: a name, or simply true. */
export const activityDoneSchema = z.object({
	code: oneOf('activity', ACTIVITY_CODES),
	minutes: bounded('minutes').nullish(),
	repetitions: bounded('repetitions').nullish(),
	distanceM: bounded('distanceM').nullish(),
	elevationDeg: bounded('elevationDeg').nullish(),
	steps: bounded('steps').nullish(),
	/** Balls of the spirometer held up, halves allowed. */
	balls: bounded('balls').nullish(),
	assistance: oneOf('assistance', ASSISTANCE).nullish(),
	helper: z
		.union([z.boolean(), z.string().trim().max(NAME_MAX)], {
			error: ({ input }) => `helper is ${shown(input)}: it must be a name, true or false.`
		})
		.nullish(),
	notDone: yesNo('notDone').nullish()
});
export type ActivityDone = z.output<typeof activityDoneSchema>;

const assessShape = {
	context: contextSchema,
	before: readingSchema.nullish().transform((reading): Reading => reading ?? {}),
	during: z
		.array(readingSchema)
		.max(LIST_MAX)
		.nullish()
		.transform((readings) => readings ?? []),
	after: readingSchema.nullish().transform((reading): Reading => reading ?? {}),
	symptoms: z
		.array(symptomSchema)
		.max(LIST_MAX)
		.nullish()
		.transform((symptoms) => symptoms ?? []),
	activities: z
		.array(activityDoneSchema)
		.max(LIST_MAX)
		.nullish()
		.transform((activities) => activities ?? [])
};

/** The body of `POST /api/assess`. Lists and readings left out are empty, and an empty reading is a missing one. */
export const assessBody = z.object(assessShape);
/** What the response rules judge. */
export type Assessment = z.output<typeof assessBody>;

/** Why something was done against a rule that was known: whose word it rests on and whether it was read back. */
export const deviationSchema = z.object({
	reason: text('reason', TEXT_MAX),
	verbalFrom: text('verbalFrom', NAME_MAX).nullish(),
	readBack: yesNo('readBack').nullish()
});
export type Deviation = z.output<typeof deviationSchema>;

/** The body of `POST /api/episodes/:id/sessions`: the same, with when it was and at which level. */
export const sessionBody = z
	.object({
		...assessShape,
		startedAt: instant('startedAt'),
		endedAt: instant('endedAt'),
		level: levelSchema,
		deviation: deviationSchema.nullish()
	})
	.superRefine(({ startedAt, endedAt }, ctx) => {
		if (Date.parse(endedAt) < Date.parse(startedAt)) {
			const message = `endedAt is ${endedAt}: it must not lie before startedAt, ${startedAt}.`;
			ctx.addIssue({ code: 'custom', path: ['endedAt'], message, input: endedAt });
		}
	});
export type SessionBody = z.output<typeof sessionBody>;
