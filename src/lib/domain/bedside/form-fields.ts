/** The kinds of field that the bedside schemas are made of. Each message names field, value and what is allowed. */
import { z } from 'zod';
import { LEVELS } from '../core/codes';
import { tooLong } from '../core/fields';
import { BOUNDS, type BoundedField } from './bounds';

/** What was sent, as far as it may be repeated in a message: short, and never a whole object. */
export function shown(value: unknown): string {
	if (value === undefined) {
		return 'missing';
	}
	return typeof value === 'object' && value !== null
		? 'not a plain value'
		: JSON.stringify(value).slice(0, 60);
}

/** A number from `low` to `high`, called by the name the sender used. */
export function numberWithin(
	called: string,
	{ low, high, unit }: { low: number; high: number; unit: string }
) {
	const error = ({ input }: { input?: unknown }) =>
		`${called} is ${shown(input)}: it must be a number from ${low} to ${high}${unit && ` ${unit}`}.`;
	return z.number({ error }).min(low, { error }).max(high, { error });
}

/** A number within the hard bounds of its field. */
export function bounded(field: BoundedField, called: string = field) {
	return numberWithin(called, BOUNDS[field]);
}

/** One of a closed list. */
export function oneOf<const T extends readonly [string, ...string[]]>(called: string, list: T) {
	return z.enum(list, {
		error: ({ input }) => `${called} is ${shown(input)}: it must be one of ${list.join(', ')}.`
	});
}

/** Yes or no, and nothing that merely looks like it. */
export function yesNo(called: string) {
	return z.boolean({ error: ({ input }) => `${called} is ${shown(input)}: it must be true or false.` });
}

/** Free text that is not empty, with the blanks at its ends taken off. */
export function text(called: string, max: number) {
	return z
		.string({ error: ({ input }) => `${called} is ${shown(input)}: it must be text.` })
		.trim()
		.min(1, { error: `${called} is empty: it must hold 1 to ${max} characters.` })
		.max(max, tooLong(called, max));
}

/**
 * The message of a value that may be a bare word or an object. An object is answered with what is wrong inside
 * it, which zod keeps with the branch (the last one here), rather than with 'neither of the two'.
 */
export function wordOrObject(called: string, list: readonly string[], shape: string) {
	return (issue: { input?: unknown; errors?: readonly (readonly { message: string }[])[] }): string => {
		const inside = issue.errors?.at(-1)?.[0]?.message;
		if (typeof issue.input === 'object' && issue.input !== null && inside !== undefined) {
			return inside;
		}
		return `${called} is ${shown(issue.input)}: it must be one of ${list.join(', ')}, or ${shape}.`;
	};
}

/** An instant as RFC 3339, with `Z` or an offset. */
export function instant(called: string) {
	return z.iso.datetime({
		offset: true,
		error: ({ input }) => `${called} is ${shown(input)}: it must be an instant such as 2026-03-04T09:30:00Z.`
	});
}

/** One of the six levels. */
export const levelSchema = z.literal([...LEVELS], {
	error: ({ input }) => `level is ${shown(input)}: it must be a whole number from 1 to 6.`
});
