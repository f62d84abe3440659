/** Telephone numbers: kept in the form of ITU-T E.164, `+` and at most 15 digits, so that a reply finds its patient. */

/** The country of the demonstration hospital. */
export const DEFAULT_COUNTRY = '+353';

const E164 = /^\+[1-9]\d{7,14}$/;

/** A number that cannot be called. The message names it and what was wanted. */
export class PhoneError extends RangeError {
	override readonly name = 'PhoneError';
}

/** Whether the text is a number in E.164 form, 8 to 15 digits after the `+`. */
export function isE164(value: string): boolean {
	return E164.test(value);
}

/**
 * The E.164 form of a number as people write it: with spaces, dots, dashes and brackets, `00` for `+`, or a
 * national number with its leading 0, which then gets the default country code.
 * @throws PhoneError that names the number
 */
export function normalisePhone(value: string, country: string = DEFAULT_COUNTRY): string {
	const written = value.normalize('NFKC').trim();
	if (!/^[+\d][\d\s().\-/‐-–]*$|^\([\d\s().\-/‐-–]+$/.test(written)) {
		throw refusal(value, 'write digits, such as +353 86 123 4567 or 086 123 4567');
	}
	// '+353 (0)86' is written for readers at home and abroad; only one of the two prefixes is dialled.
	const abroad = /^(\+|00)/.test(written);
	const digits = (abroad ? written.replace('(0)', '') : written).replace(/[^\d+]/g, '');
	const full = withCountry(digits, country);
	if (full === null) {
		throw refusal(value, `begin with + and the country code, or with 0 for a number in ${country}`);
	}
	if (!isE164(full)) {
		throw refusal(value, `it has ${full.length - 1} digits with the country code; 8 to 15 are needed`);
	}
	return full;
}

/** Null for a number that begins neither with its country nor with the 0 of a national one. */
function withCountry(digits: string, country: string): string | null {
	if (digits.startsWith('+')) {
		return digits;
	}
	if (digits.startsWith('00')) {
		return `+${digits.slice(2)}`;
	}
	return digits.startsWith('0') ? `${country}${digits.slice(1)}` : null;
}

function refusal(value: string, wanted: string): PhoneError {
	return new PhoneError(`'${value}' is not a telephone number: ${wanted}.`);
}
