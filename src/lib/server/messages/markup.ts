/** Documents in the gateway's markup: what a call says, and whether it waits for a digit. */

const HEAD = '<?xml version="1.0" encoding="UTF-8"?>';
/** So long it is waited for a digit after the words, in seconds; then they are said once more. */
const WAIT_SECONDS = 8;

/** Say something and hang up. */
export function spoken(text: string): string {
	return `${HEAD}<Response><Say>${escaped(text)}</Say></Response>`;
}

/**
 * Say something twice, each time waiting for a digit; then hang up.
 * @param action the address that the digit is posted to
 */
export function askedForDigit(text: string, action: string): string {
	const gather =
		`<Gather numDigits="1" timeout="${WAIT_SECONDS}" action="${escaped(action)}">` +
		`<Say>${escaped(text)}</Say></Gather>`;
	return `${HEAD}<Response>${gather}${gather}</Response>`;
}

/** The answer to a call of the gateway's. */
export function markupResponse(markup = `${HEAD}<Response/>`): Response {
	return new Response(markup, {
		headers: { 'content-type': 'text/xml; charset=utf-8', 'cache-control': 'no-store' }
	});
}

/** Control characters have no place in the document, and none in what is spoken. */
function escaped(text: string): string {
	return text
		.replace(/\p{Cc}+/gu, ' ')
		.replaceAll('&', '&amp;')
		.replaceAll('<', '&lt;')
		.replaceAll('>', '&gt;')
		.replaceAll('"', '&quot;');
}
