/**
 * The GSM 7-bit alphabet (3GPP TS 23.038, section 6.2.1) and its extension table, whose characters take two places.
 */
const GSM_BASIC = new Set(
	'@£$¥èéùìòÇ\nØø\rÅåΔ_ΦΓΛΩΠΨΣΘΞÆæßÉ !"#¤%&\'()*+,-./0123456789:;<=>?¡ABCDEFGHIJKLMNOPQRSTUVWXYZÄÖÑÜ§¿' +
		'abcdefghijklmnopqrstuvwxyzäöñüà'
);
const GSM_EXTENDED = new Set('\f^{}\\[~]|€');

/** How many text messages a body is sent as: 160 or 153 places of GSM 7-bit, else 70 or 67 of UCS-2. */
export function segmentsOf(body: string): number {
	const characters = [...body];
	if (characters.every((character) => GSM_BASIC.has(character) || GSM_EXTENDED.has(character))) {
		const places = characters.reduce((sum, character) => sum + (GSM_EXTENDED.has(character) ? 2 : 1), 0);
		return places <= 160 ? 1 : Math.ceil(places / 153);
	}
	return body.length <= 70 ? 1 : Math.ceil(body.length / 67);
}
