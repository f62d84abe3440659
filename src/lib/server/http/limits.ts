import { Problem } from '$lib/domain/core/errors';
import { env } from '../env';

/** The product's own figure: more than any person or screen needs, less than a program gone wild. */
const WINDOW_MS = 10_000;
const REQUESTS_PER_WINDOW = 100;

const windows = new Map<string, { until: number; count: number }>();

/**
 * Count a request of a person or an address.
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
