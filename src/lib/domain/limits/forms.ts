/** The bodies by which limits are changed. Each message names field, value and what is allowed; `page-forms.ts` has the forms. */
import { z } from 'zod';
import { ACTIVITY_CODES } from '../bedside/activities/codes';
import { LIMIT_KEYS, SETS } from '../bedside/codes';
import { reason, text } from '../core/fields';
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

/** The ends of a range, by themselves. */
export interface RangeEnds {
	hrMin?: number | null;
	hrMax?: number | null;
	rpeMin?: number | null;
	rpeMax?: number | null;
}

/**
 * What the schema of each field cannot say: how the ends lie to each other.
 * @param called what whoever typed them calls them
 */
export function rangeFaults(
	range: RangeEnds,
	called: Record<keyof RangeEnds, string> = RANGE_KEYS
): { path: 'hrMin' | 'hrMax' | 'rpeMin'; message: string }[] {
	const below = (low: 'hrMin' | 'rpeMin', high: 'hrMax' | 'rpeMax') => {
		const [from, to] = [range[low], range[high]];
		const message = `${called[low]} is ${from} and ${called[high]} is ${to}: the range must not end below its start.`;
		return from != null && to != null && from > to ? [{ path: low, message }] : [];
	};
	const message = `${called.hrMax} and ${called.rpeMax} are missing: a range has at least one upper end.`;
	const open = range.hrMax == null && range.rpeMax == null ? [{ path: 'hrMax' as const, message }] : [];
	return [...below('hrMin', 'hrMax'), ...below('rpeMin', 'rpeMax'), ...open];
}

const RANGE_KEYS = { hrMin: 'hrMin', hrMax: 'hrMax', rpeMin: 'rpeMin', rpeMax: 'rpeMax' };

/** The figures of a dose, and how far each may run. */
export const SPAN_MAX = { minutes: 240, repetitions: 500, timesADay: 24 } as const;

/** A span of a dose: from and to, both included. */
const span = (name: keyof typeof SPAN_MAX, max: number = SPAN_MAX[name]) =>
	z
		.tuple([z.number(), z.number()], {
			error: ({ input }) => `${name} is ${JSON.stringify(input)}: it must be two numbers, from and to.`
		})
		.refine((ends) => spanFault(name, ends, max) === null, {
			error: ({ input }) => spanFault(name, input as [number, number], max) ?? ''
		})
		.nullable();

/** What is wrong with the two ends of a span, or null. */
export function spanFault(called: string, [from, to]: readonly [number, number], max: number): string | null {
	return from > 0 && from <= to && to <= max
		? null
		: `${called} is ${from} to ${to}: it must run from more than 0 to at most ${max}, and not end below its start.`;
}

/** The most lines of one part of an activity, and the most characters of a line. */
export const LINES_MAX = 8;
export const LINE_MAX = 200;

const lines = (name: string, least = 1) =>
	z
		.array(text(`a line of ${name}`, LINE_MAX), `${name} is a list of lines.`)
		.min(least, noLines(name))
		.max(LINES_MAX, { error: ({ input }) => tooManyLines(name, (input as unknown[]).length) });

export const noLines = (called: string) => `${called} is empty: it must have 1 to ${LINES_MAX} lines.`;
export const tooManyLines = (called: string, count: number) =>
	`${called} has ${count} lines, and the limit is ${LINES_MAX}.`;

/** What a unit says about an activity: null goes back to the catalogue. */
export const wordActivityBody = z.strictObject({
	code: z.enum(ACTIVITY_CODES, 'code is no activity of the catalogue.'),
	lines: z
		.strictObject({
			name: text('name', 80).optional(),
			needs: lines('needs', 0).optional(),
			dose: z.strictObject({
				minutes: span('minutes'),
				repetitions: span('repetitions'),
				timesADay: span('timesADay'),
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
