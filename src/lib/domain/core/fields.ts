import { z } from 'zod';

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

/** Tabs and line breaks are fine; NUL, escape, and halves of a surrogate pair have no place in a record. */
function hasControlCharacters(value: string): boolean {
	return /[^\P{Cc}\t\n\r]|\p{Cs}/u.test(value);
}
