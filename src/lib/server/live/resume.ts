import { Problem } from '$lib/domain/core/errors';

/**
 * Where a client wants to go on: `Last-Event-ID` when its browser reconnects, `?after=` when a page opens the
 * stream. The header is newer and wins. Null when neither is there.
 * @throws Problem `malformed` for anything but a decimal integer
 */
export function resumePoint(headers: Headers, url: URL): number | null {
	const asked = headers.get('last-event-id') || url.searchParams.get('after');
	if (!asked) {
		return null;
	}
	const cursor = Number(asked);
	if (!/^\d{1,15}$/.test(asked) || !Number.isSafeInteger(cursor)) {
		throw new Problem('malformed', `The event id ${asked.slice(0, 40)} is not a decimal integer.`);
	}
	return cursor;
}
