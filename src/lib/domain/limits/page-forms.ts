/**
 * The forms by which limits are changed: each field as it was typed, called by the words of its label. The bodies in
 * `forms.ts` are what the JSON API takes and names.
 */
import { z } from 'zod';
import { ACTIVITY_CODES } from '../bedside/activities/codes';
import { BOUNDS } from '../bedside/bounds';
import { LIMIT_KEYS, SETS } from '../bedside/codes';
import { PRESCRIBING_METHODS } from '../bedside/limits/prescribed';
import { reason, text, tooLong, typedDay, typedNumber } from '../core/fields';
import { numberOf, readNumber } from '../core/typed-number';
import { LINE_MAX, LINES_MAX, noLines, rangeFaults, SPAN_MAX, spanFault, tooManyLines } from './forms';
import type { RangeEnds } from './forms';
import { rowsOf } from './rows';

const key = z.enum(LIMIT_KEYS, 'Limit: choose one.');
const agreed = { agreedBy: text('Clinical lead', 100), agreedOn: typedDay('Agreed on') };

/** Left empty the limit goes back to its default. */
export const changeUnitLimitForm = z.strictObject({
	set: z.enum(SETS, 'Set: choose one.'),
	key,
	value: typedNumber('New value'),
	...agreed
});

export const chooseUnitSetForm = z.strictObject({
	set: z.enum(['strict', 'guideline'], 'Set: choose one.'),
	...agreed
});

export const setPatientLimitForm = z.strictObject({
	key,
	value: typedNumber('New value', { needed: true }),
	reason: reason('Reason'),
	untilOn: typedDay('Last day')
});

const ENDS = {
	hrMin: 'Pulse from',
	hrMax: 'Pulse to',
	rpeMin: 'Exertion from',
	rpeMax: 'Exertion to'
} as const;

export const prescribeRangeForm = z
	.strictObject({
		hrMin: typedNumber(ENDS.hrMin, BOUNDS.hr),
		hrMax: typedNumber(ENDS.hrMax, BOUNDS.hr),
		rpeMin: typedNumber(ENDS.rpeMin, BOUNDS.rpe),
		rpeMax: typedNumber(ENDS.rpeMax, BOUNDS.rpe),
		method: z.enum(PRESCRIBING_METHODS, 'How it was found: choose one.'),
		note: z.string().trim().max(300, tooLong('Note', 300))
	})
	.superRefine((typed, ctx) => {
		// An end that is no number is no open end either: it is said by itself.
		for (const { path, message } of unreadable(typed) ? [] : rangeFaults(endsOf(typed), ENDS)) {
			ctx.addIssue({ code: 'custom', path: [path], message });
		}
	});

type TypedEnds = Record<keyof RangeEnds, string>;

function unreadable({ hrMin, hrMax, rpeMin, rpeMax }: TypedEnds): boolean {
	return [hrMin, hrMax, rpeMin, rpeMax].some((end) => readNumber(end).kind === 'unreadable');
}

/** The ends of a range as they were typed; an empty one stays open. */
export function endsOf({ hrMin, hrMax, rpeMin, rpeMax }: TypedEnds) {
	return {
		hrMin: numberOf(hrMin),
		hrMax: numberOf(hrMax),
		rpeMin: numberOf(rpeMin),
		rpeMax: numberOf(rpeMax)
	};
}

const SPANS = { minutes: 'Minutes', repetitions: 'Repetitions', timesADay: 'Times a day' } as const;
type SpanName = keyof typeof SPANS;
const SPAN_NAMES = Object.keys(SPANS) as SpanName[];

const end = (name: SpanName, which: 'from' | 'to') => typedNumber(`${SPANS[name]}, ${which}`);

/** Lines in the rows of one text. */
const lines = (field: string, least: 0 | 1) =>
	z
		.string(`${field} is missing or no text.`)
		.trim()
		.superRefine((typed, ctx) => {
			for (const message of lineFaults(field, rowsOf(typed), least)) {
				ctx.addIssue({ code: 'custom', message });
			}
		});

function lineFaults(field: string, rows: readonly string[], least: 0 | 1): string[] {
	if (rows.length < least) {
		return [noLines(field)];
	}
	const parsed = rows.map((row, at) => text(`${field}, line ${at + 1},`, LINE_MAX).safeParse(row));
	return [
		...(rows.length > LINES_MAX ? [tooManyLines(field, rows.length)] : []),
		...parsed.flatMap(({ error }) => error?.issues.map(({ message }) => message) ?? [])
	];
}

/** An activity as a unit words it: lines as rows of a text, a span as two numbers that may both be empty. */
export const wordActivityForm = z
	.strictObject({
		code: z.enum(ACTIVITY_CODES, 'Activity: choose one.'),
		name: text('Name', 80),
		needs: lines('Also needed first', 0),
		words: text('Usual dose in words', 200),
		minutesFrom: end('minutes', 'from'),
		minutesTo: end('minutes', 'to'),
		repetitionsFrom: end('repetitions', 'from'),
		repetitionsTo: end('repetitions', 'to'),
		timesADayFrom: end('timesADay', 'from'),
		timesADayTo: end('timesADay', 'to'),
		howTo: lines('How', 1),
		watch: lines('Watch', 1),
		never: lines('Never', 1),
		...agreed
	})
	.superRefine((typed, ctx) => {
		for (const name of SPAN_NAMES) {
			const message = typedSpanFault(name, typed[`${name}From`], typed[`${name}To`]);
			if (message !== null) {
				ctx.addIssue({ code: 'custom', path: [`${name}From`], message });
			}
		}
	});
export type WordActivityFields = z.output<typeof wordActivityForm>;

function typedSpanFault(name: SpanName, from: string, to: string): string | null {
	if ([from, to].some((typed) => readNumber(typed).kind === 'unreadable')) {
		return null;
	}
	const span = spanOf(from, to);
	return span && spanFault(SPANS[name], span, SPAN_MAX[name]);
}

/** A span as its ends were typed: of which one end is empty it is that one figure. */
export function spanOf(from: string, to: string): [number, number] | null {
	const [low, high] = [numberOf(from) ?? numberOf(to), numberOf(to) ?? numberOf(from)];
	return low === null || high === null ? null : [low, high];
}

export const resetActivityForm = z.strictObject({
	code: z.enum(ACTIVITY_CODES, 'Activity: choose one.'),
	...agreed
});
