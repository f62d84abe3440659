/** What the service worker makes of a message that was pushed to this device. It runs without any page. */

/** What a notice shows, and the page that it opens. */
export interface PushedNotice {
	title: string;
	body: string;
	/** Of our own origin. */
	url: string;
	/** A later notice of the same takes the place of an earlier one. */
	tag: string;
}

/** Where everybody finds what waits on them; for a message that names no page of ours. */
const FALLBACK = '/loose-ends';

/**
 * Read a message. Something is shown whatever it is: a browser that is pushed to and shows nothing takes the permission
 * away.
 * @param origin ours: no other page is ever opened
 */
export function readNotice(text: string | null, origin: string): PushedNotice {
	const { title, body, url, tag } = parsed(text);
	return {
		title: wordsOf(title) || 'Ropewalk',
		body: wordsOf(body),
		url: ownAddress(wordsOf(url), origin),
		tag: wordsOf(tag)
	};
}

function parsed(text: string | null): Record<string, unknown> {
	try {
		const value: unknown = JSON.parse(text ?? '');
		return typeof value === 'object' && value !== null ? (value as Record<string, unknown>) : {};
	} catch {
		return {};
	}
}

function wordsOf(value: unknown): string {
	return typeof value === 'string' ? value : '';
}

function ownAddress(url: string, origin: string): string {
	const own = url !== '' && URL.canParse(url, origin) && new URL(url, origin).origin === origin;
	return new URL(own ? url : FALLBACK, origin).href;
}
