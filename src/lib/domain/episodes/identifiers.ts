/**
 * Hospital numbers and beds are stored as they were written, because staff and other programs look for them in that
 * form, and compared without case and spaces, because a second spelling must not make a second patient or bed.
 */

/** As it is stored: no outer or doubled spaces, no invisible characters, full-width digits as plain ones. */
export function written(typed: string): string {
	return typed
		.normalize('NFKC')
		.replace(/\p{Cf}+/gu, '')
		.replace(/\s+/gu, ' ')
		.trim();
}

/** What two spellings of one number or bed have in common: `t 9` and `T9` are both `T9`. */
export function spellingKey(typed: string): string {
	return written(typed).replaceAll(' ', '').toUpperCase();
}

/** As `spellingKey()`, without the signs that part a hospital number: `SG40098` is `SG-40098`. */
export function numberKey(typed: string): string {
	return NUMBER_SIGNS.reduce((key, sign) => key.replaceAll(sign, ''), spellingKey(typed));
}

/** What people leave out of a hospital number, or put in. */
export const NUMBER_SIGNS = ['-', '.', '/'] as const;

/** A name without doubled spaces, as it is stored. */
export function normaliseName(typed: string): string {
	return typed.normalize('NFC').replace(/\s+/gu, ' ').trim();
}

/** Whether two spellings are one name: case and spaces do not make another person. */
export function isSameName(a: string, b: string): boolean {
	return normaliseName(a).toLowerCase() === normaliseName(b).toLowerCase();
}
