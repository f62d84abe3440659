import { invalidField } from '$lib/domain/core/errors';

export const MAX_LIMIT = 200;
const DEFAULT_LIMIT = 100;

export interface PageRequest {
	limit: number;
	after: string | null;
}

export interface Page<T> {
	items: T[];
	next: string | null;
}

/**
 * `?limit=&after=` of a list; the limit is clamped to 1..200.
 * @throws Problem `invalid` for a limit that is no number
 */
export function pageRequest(url: URL, fallback = DEFAULT_LIMIT): PageRequest {
	const asked = url.searchParams.get('limit');
	const limit = asked === null ? fallback : Number(asked);
	if (!Number.isFinite(limit)) {
		throw invalidField('/limit', `limit "${asked}" is not a number from 1 to ${MAX_LIMIT}.`);
	}
	return {
		limit: Math.min(MAX_LIMIT, Math.max(1, Math.trunc(limit))),
		after: url.searchParams.get('after') || null
	};
}

/** Cut rows that were fetched with `limit + 1` into a page and the cursor of the next one. */
export function page<T>(rows: T[], request: PageRequest, cursorOf: (row: T) => string): Page<T> {
	const items = rows.slice(0, request.limit);
	const last = items.at(-1);
	return { items, next: rows.length > request.limit && last !== undefined ? cursorOf(last) : null };
}
