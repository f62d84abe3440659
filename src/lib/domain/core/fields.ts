import { z } from 'zod';
import { isLocalDate } from './time';
import { readDate } from './typed-date';

/**
 * Text that a person types: trimmed, not empty, with a limit that the message names.
 * @param field the name of the field as a sentence begins with it, such as `The question`: people read it
 */
export function text(field: string, max: number) {
	return z
		.string(`${field} is missing or no text.`)
		.trim()
		.min(1, `${field} is empty.`)
		.max(max, `${field} has at most ${max} characters.`)
		.refine((value) => !hasControlCharacters(value), `${field} contains a control character.`);
}

/** Why somebody declines, withholds, withdraws or passes on. */
export function reason(field: string) {
	return text(field, 1000);
}

/**
 * A day as a form posts it, written as people write days: it comes out as `2026-12-14`. What is no day stays as it
 * was typed, so that it can be put right; the message says what was read and what is wanted.
 * @param field the name of the field as a sentence begins with it
 */
export function typedDay(field: string) {
	return z
		.string(`${field} is missing or no text.`)
		.max(40, `${field} has at most 40 characters.`)
		.transform((typed) => readDate(typed) ?? typed)
		.refine(isLocalDate, { error: ({ input }) => noDay(field, String(input)) });
}

function noDay(field: string, typed: string): string {
	return typed.trim() === ''
		? `${field}: write a day, such as 14 12 2026.`
		: `${field}: “${typed}” is no day; write one that exists, such as 14 12 2026.`;
}

/** Tabs and line breaks are fine; NUL, escape, and halves of a surrogate pair have no place in a record. */
function hasControlCharacters(value: string): boolean {
	return /[^\P{Cc}\t\n\r]|\p{Cs}/u.test(value);
}
