import { Problem } from '$lib/domain/core/errors';
import { env } from '../env';

/** The product's own figure: more than any person or screen needs, less than a program gone wild. */
const WINDOW_MS = 10_000;
const REQUESTS_PER_WINDOW = 100;

const windows = new Map<string, { until: number; count: number }>();

/** Asked often, by machines: health checks, files of the build, and the gateway, which does not send a refused status again. */
const UNCOUNTED = /^\/(healthz$|readyz$|metrics$|_app\/|api\/hooks\/)/;
/** The link of a call for help, with the shape of its token. */
const CALL = /^\/t\/([\w-]{22})(?:\/|$)/;

/** The link of a patient's own page. */
const PAGE = /^\/p\/([\w-]{22})(?:\/|$)/;

/** The token in an address that could be the link to a patient's page; null in any other. */
export function pageTokenIn(pathname: string): string | null {
	return PAGE.exec(pathname)?.[1] ?? null;
}

/** The token in an address that could be the link of a call for help; null in any other. */
export function linkTokenIn(pathname: string): string | null {
	return CALL.exec(pathname)?.[1] ?? null;
}

/**
 * For whom a request counts: the link of a call for help, else the person, else the address; null for what is
 * never refused. A whole hospital can stand behind one address, and its nurses must be able to look at a call and
 * take it; the link is what tells them apart. A link that does not exist tells nobody apart: made-up ones count
 * for who sends them, and no list of them grows.
 * @param link the token of a link that exists; null for none
 */
export function countedFor(
	{ method, pathname }: { method: string; pathname: string },
	personId: string | null,
	address: string | null,
	link: string | null
): string | null {
	if (UNCOUNTED.test(pathname)) {
		return null;
	}
	if (link === null) {
		return personId ?? address ?? 'nobody';
	}
	return method === 'POST' ? null : `link:${link}`;
}

/**
 * Count a request of whoever {@link countedFor} names.
 * @throws Problem `too-many` with the seconds to wait
 */
export function countRequest(who: string, now: number): void {
	const limit = REQUESTS_PER_WINDOW * env().rateLimitScale;
	const window = windows.get(who);
	if (!window || window.until <= now) {
		if (windows.size > 10_000) {
			forgetOld(now);
		}
		windows.set(who, { until: now + WINDOW_MS, count: 1 });
		return;
	}
	window.count += 1;
	if (window.count > limit) {
		const seconds = Math.ceil((window.until - now) / 1000);
		throw new Problem('too-many', `More than ${limit} requests in ${WINDOW_MS / 1000} seconds.`, {
			retryAfterSeconds: seconds
		});
	}
}

function forgetOld(now: number): void {
	for (const [who, window] of windows) {
		if (window.until <= now) {
			windows.delete(who);
		}
	}
}
