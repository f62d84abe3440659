/**
 * Hospital numbers and beds in the one form in which they are stored and compared: what people type differs in
 * case and in spaces, and a second spelling must not make a second patient or a second bed.
 */

/** `t 9` is `T9`: capitals, no spaces, no invisible characters, full-width digits as plain ones. */
function compact(typed: string): string {
	return typed
		.normalize('NFKC')
		.replace(/[\s\p{Cf}]+/gu, '')
		.toUpperCase();
}

/** The hospital number as it is stored; empty when nothing but spaces was typed. */
export function normaliseMrn(typed: string): string {
	return compact(typed);
}

/** The bed as it is stored; empty when nothing but spaces was typed. */
export function normaliseBed(typed: string): string {
	return compact(typed);
}

/** A name without doubled spaces, as it is stored. */
export function normaliseName(typed: string): string {
	return typed.normalize('NFC').replace(/\s+/gu, ' ').trim();
}

/** Whether two spellings are one name: case and spaces do not make another person. */
export function isSameName(a: string, b: string): boolean {
	return normaliseName(a).toLowerCase() === normaliseName(b).toLowerCase();
}
