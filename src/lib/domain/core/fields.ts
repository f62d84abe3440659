import { z } from 'zod';

/** Text that a person types: trimmed, not empty, with a limit that the message names. */
export function text(field: string, max: number) {
	return z
		.string(`${field} is a text.`)
		.trim()
		.min(1, `${field} is empty.`)
		.max(max, `${field} has at most ${max} characters.`)
		.refine((value) => !hasControlCharacters(value), `${field} contains a control character.`);
}

/** Why somebody declines, withholds, withdraws or passes on. */
export function reason(field: string) {
	return text(field, 1000);
}

/** Tabs and line breaks are fine; NUL, escape, and halves of a surrogate pair have no place in a record. */
function hasControlCharacters(value: string): boolean {
	return /[^\P{Cc}\t\n\r]|\p{Cs}/u.test(value);
}
