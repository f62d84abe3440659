import { z } from 'zod';
import { isLocalDate, isLocalTime } from './time';
import { readDate, readTime } from './typed-date';
import { readNumber } from './typed-number';

/**
 * Text that a person types: trimmed, not empty, with a limit that the message names.
 * @param field the name of the field as a sentence begins with it, such as `The question`: people read it
 */
export function text(field: string, max: number) {
	return z
		.string(`${field} is missing or no text.`)
		.trim()
		.min(1, `${field} is empty.`)
		.max(max, tooLong(field, max))
		.refine((value) => !hasControlCharacters(value), `${field} contains a control character.`);
}

/** What is said of a text over its limit: how long it is, so that one knows how much has to go. */
export function tooLong(field: string, max: number) {
	return {
		error: ({ input }: { input?: unknown }) =>
			`${field} has ${String(input).length} characters, and the limit is ${max}.`
	};
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
		.max(40, tooLong(field, 40))
		.transform((typed) => readDate(typed) ?? typed)
		.refine(isLocalDate, { error: ({ input }) => noDay(field, String(input)) });
}

/**
 * A time of the 24 h clock as a form posts it: it comes out as `09:30`; what is none stays as it was typed.
 * @param field the name of the field as a sentence begins with it
 */
export function typedTime(field: string) {
	return z
		.string(`${field} is missing or no text.`)
		.max(40, tooLong(field, 40))
		.transform((typed) => readTime(typed) ?? typed)
		.refine(isLocalTime, { error: ({ input }) => noTime(field, String(input)) });
}

interface NumberWanted {
	low?: number;
	high?: number;
	unit?: string;
	whole?: boolean;
	/** Whether leaving it empty is a mistake. */
	needed?: boolean;
}

/**
 * A number as a form posts it: the text as it was typed, which `numberOf` reads once it is checked. What is no number
 * is a mistake and never an empty field.
 * @param field the name of the field as a sentence begins with it
 */
export function typedNumber(field: string, wanted: NumberWanted = {}) {
	return z
		.string(`${field} is missing or no text.`)
		.max(40, { ...tooLong(field, 40), abort: true })
		.superRefine((typed, ctx) => {
			const message = wrongNumber(field, typed, wanted);
			if (message !== null) {
				ctx.addIssue({ code: 'custom', message });
			}
		});
}

function wrongNumber(field: string, typed: string, wanted: NumberWanted): string | null {
	const { low = -Infinity, high = Infinity, whole = false, needed = false } = wanted;
	const read = readNumber(typed);
	switch (read.kind) {
		case 'empty':
			return needed ? `${field} is empty: ${wish(wanted)}` : null;
		case 'unreadable':
			return `${field}: “${typed.trim()}” is no number; ${wish(wanted)}`;
		case 'number': {
			const right = read.value >= low && read.value <= high && (!whole || Number.isInteger(read.value));
			return right ? null : `${field}: ${read.value} cannot be taken; ${wish(wanted)}`;
		}
	}
}

function wish({ low, high, unit = '', whole = false }: NumberWanted): string {
	return low === undefined || high === undefined
		? 'write one such as 12 or 12.5.'
		: `write a ${whole ? 'whole ' : ''}number from ${low} to ${high}${unit && ` ${unit}`}.`;
}

/** What is said of what is no day: what was read, and what is wanted. */
export function noDay(field: string, typed: string): string {
	return typed.trim() === ''
		? `${field}: write a day, such as 14 12 2026.`
		: `${field}: “${typed}” is no day; write one that exists, such as 14 12 2026.`;
}

/** What is said of what is no time. */
export function noTime(field: string, typed: string): string {
	const wish = 'write one from 00:00 to 23:59, such as 9:30.';
	return typed.trim() === '' ? `${field}: ${wish}` : `${field}: “${typed}” is no time; ${wish}`;
}

/** Tabs and line breaks are fine; NUL, escape, and halves of a surrogate pair have no place in a record. */
function hasControlCharacters(value: string): boolean {
	return /[^\P{Cc}\t\n\r]|\p{Cs}/u.test(value);
}
