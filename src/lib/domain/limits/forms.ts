/** The bodies and forms by which limits are changed. Each message names field, value and what is allowed. */
import { z } from 'zod';
import { ACTIVITY_CODES } from '../bedside/activities/codes';
import { LIMIT_KEYS, SETS } from '../bedside/codes';
import { reason, text, typedDay } from '../core/fields';
import { BOUNDS } from '../bedside/bounds';
import { numberWithin } from '../bedside/form-fields';
import { PRESCRIBING_METHODS } from '../bedside/limits/prescribed';

const setName = z.enum(SETS, `set is one of ${SETS.join(', ')}.`);
const key = z.enum(LIMIT_KEYS, 'key is no limit of the response rules.');
const value = z.number('value is a number.');
const agreed = {
	/** The clinical lead who answers for the change. */
	agreedBy: text('agreedBy', 100),
	agreedOn: z.iso.date('agreedOn is a date like 2026-12-14.')
};

/** A unit's limit; a value of null goes back to the default. */
export const changeUnitLimitBody = z.strictObject({ set: setName, key, value: value.nullable(), ...agreed });
export type ChangeUnitLimit = z.output<typeof changeUnitLimitBody>;

/** Which set judges the inpatients of a unit. */
export const chooseUnitSetBody = z.strictObject({
	set: z.enum(['strict', 'guideline'], 'set is strict or guideline.'),
	...agreed
});
export type ChooseUnitSet = z.output<typeof chooseUnitSetBody>;

/** A limit for one patient, with its reason and the last day on which it holds. */
export const setPatientLimitBody = z.strictObject({
	key,
	value,
	reason: reason('reason'),
	untilOn: z.iso.date('untilOn is a date like 2026-12-14.')
});
export type SetPatientLimit = z.output<typeof setPatientLimitBody>;

/** As forms post it: the day as it was typed. */
const agreedForm = { ...agreed, agreedOn: typedDay('Agreed on') };

/** The same as forms post them: a number that is not typed is missing, never nought. */
export const changeUnitLimitForm = changeUnitLimitBody.extend({ value: value.optional(), ...agreedForm });
export const chooseUnitSetForm = chooseUnitSetBody.extend(agreedForm);
export const setPatientLimitForm = setPatientLimitBody.extend({
	value: value.optional(),
	untilOn: typedDay('The last day')
});

const rangeShape = {
	hrMin: numberWithin('hrMin', BOUNDS.hr).nullish(),
	hrMax: numberWithin('hrMax', BOUNDS.hr).nullish(),
	rpeMin: numberWithin('rpeMin', BOUNDS.rpe).nullish(),
	rpeMax: numberWithin('rpeMax', BOUNDS.rpe).nullish(),
	/** How its figures were found. */
	method: z.enum(PRESCRIBING_METHODS, `method is one of ${PRESCRIBING_METHODS.join(', ')}.`)
};

/** A range for an outpatient; an end that is left out stays open, and at least one upper end is given. */
export const prescribeRangeBody = z
	.strictObject({ ...rangeShape, note: text('note', 300).optional() })
	.superRefine((range, ctx) => {
		for (const { path, message } of rangeFaults(range)) {
			ctx.addIssue({ code: 'custom', path: [path], message });
		}
	});
export type PrescribeRange = z.output<typeof prescribeRangeBody>;

/** The same as a form posts it. */
export const prescribeRangeForm = z.strictObject({
	...rangeShape,
	note: z.string().trim().max(300, 'note is longer than 300 characters.')
});

/** What the schema of each field cannot say: how the ends lie to each other. */
export function rangeFaults(
	range: Pick<z.output<typeof prescribeRangeForm>, 'hrMin' | 'hrMax' | 'rpeMin' | 'rpeMax'>
): { path: 'hrMin' | 'hrMax' | 'rpeMin'; message: string }[] {
	const below = (low: 'hrMin' | 'rpeMin', high: 'hrMax' | 'rpeMax') => {
		const [from, to] = [range[low], range[high]];
		return from != null && to != null && from > to
			? [
					{
						path: low,
						message: `${low} is ${from} and ${high} is ${to}: the range must not end below its start.`
					}
				]
			: [];
	};
	const open =
		range.hrMax == null && range.rpeMax == null
			? [
					{
						path: 'hrMax' as const,
						message: 'hrMax and rpeMax are missing: a range has at least one upper end.'
					}
				]
			: [];
	return [...below('hrMin', 'hrMax'), ...below('rpeMin', 'rpeMax'), ...open];
}

/** A span of a dose: from and to, both included. */
const span = (name: string, max: number) =>
	z
		.tuple([z.number(), z.number()], {
			error: ({ input }) => `${name} is ${JSON.stringify(input)}: it must be two numbers, from and to.`
		})
		.refine(([from, to]) => from > 0 && from <= to && to <= max, {
			error: ({ input }) =>
				`${name} is ${(input as number[]).join(' to ')}: it must run from more than 0 to at most ${max}, and not end below its start.`
		})
		.nullable();

/** The most lines of one part of an activity, and the most characters of a line. */
export const LINES_MAX = 8;
export const LINE_MAX = 200;

const lines = (name: string, least = 1) =>
	z
		.array(text(`a line of ${name}`, LINE_MAX), `${name} is a list of lines.`)
		.min(least, `${name} is empty: it must have 1 to ${LINES_MAX} lines.`)
		.max(LINES_MAX, {
			error: ({ input }) => `${name} has ${(input as unknown[]).length} lines: at most ${LINES_MAX}.`
		});

/** What a unit says about an activity: null goes back to the catalogue. */
export const wordActivityBody = z.strictObject({
	code: z.enum(ACTIVITY_CODES, 'code is no activity of the catalogue.'),
	lines: z
		.strictObject({
			name: text('name', 80).optional(),
			needs: lines('needs', 0).optional(),
			dose: z.strictObject({
				minutes: span('minutes', 240),
				repetitions: span('repetitions', 500),
				timesADay: span('timesADay', 24),
				words: text('words', 200)
			}),
			howTo: lines('howTo'),
			watch: lines('watch'),
			never: lines('never')
		})
		.nullable(),
	...agreed
});
export type WordActivity = z.output<typeof wordActivityBody>;

/** The same as a form posts it: lines as rows of a text, a span as two numbers that may both be empty. */
export const wordActivityForm = z.strictObject({
	code: wordActivityBody.shape.code,
	name: text('name', 80),
	needs: z.string().trim().max(1600, 'needs has at most 1600 characters.'),
	words: text('words', 200),
	minutesFrom: z.number().optional(),
	minutesTo: z.number().optional(),
	repetitionsFrom: z.number().optional(),
	repetitionsTo: z.number().optional(),
	timesADayFrom: z.number().optional(),
	timesADayTo: z.number().optional(),
	howTo: text('howTo', 1600),
	watch: text('watch', 1600),
	never: text('never', 1600),
	...agreedForm
});
export type WordActivityFields = z.output<typeof wordActivityForm>;

export const resetActivityForm = z.strictObject({ code: wordActivityBody.shape.code, ...agreedForm });
