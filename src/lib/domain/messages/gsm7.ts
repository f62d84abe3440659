/**
 * The GSM 7 bit default alphabet, which a text message costs least in.
 * Source: 3GPP TS 23.038, section 6.2.1; the mapping table of the Unicode Consortium (GSM0338).
 */

/** The 127 characters of the table, in its order; the escape at 0x1B is no character. */
const BASIC =
	'@£$¥èéùìòÇ\nØø\rÅåΔ_ΦΓΛΩΠΨΣΘΞÆæßÉ !"#¤%&\'()*+,-./0123456789:;<=>?' +
	'¡ABCDEFGHIJKLMNOPQRSTUVWXYZÄÖÑÜ§¿abcdefghijklmnopqrstuvwxyzäöñüà';
/** What is written as an escape and a second septet. */
const EXTENSION = '\f^{}\\[~]|€';

const SEPTETS = new Map<string, number>([
	...[...BASIC].map((character) => [character, 1] as const),
	...[...EXTENSION].map((character) => [character, 2] as const)
]);

/** How many septets the character takes, 1 or 2; null when the alphabet does not have it. */
export function septetsOf(character: string): number | null {
	return SEPTETS.get(character) ?? null;
}

/** Whether the whole text can be written in the alphabet. */
export function isGsm7(text: string): boolean {
	return [...text].every((character) => SEPTETS.has(character));
}

/** What typing and pasting brings along, and its plain form. */
const PLAIN: Record<string, string> = {
	'‘': "'",
	'’': "'",
	'‚': "'",
	'“': '"',
	'”': '"',
	'„': '"',
	'–': '-',
	'—': '-',
	'‐': '-',
	'‑': '-',
	'…': '...',
	'`': "'",
	'´': "'",
	'\u00a0': ' ',
	'\u202f': ' ',
	'\t': ' ',
	ł: 'l',
	Ł: 'L',
	đ: 'd',
	Đ: 'D',
	ç: 'c'
};

/**
 * The text with quotes, dashes and accents made plain where the alphabet has no other way, so that one name
 * such as Dún Áras does not halve the room of the whole message. What has no plain form stays as it is.
 */
export function toGsm7(text: string): string {
	return [...text.normalize('NFC')].map(plain).join('');
}

function plain(character: string): string {
	if (SEPTETS.has(character)) {
		return character;
	}
	const known = PLAIN[character];
	if (known !== undefined) {
		return known;
	}
	const bare = character.normalize('NFKD').replace(/\p{M}/gu, '');
	return bare !== '' && isGsm7(bare) ? bare : character;
}
