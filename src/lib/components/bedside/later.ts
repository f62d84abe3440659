import type * as LaterParts from './later-parts';

type Parts = typeof LaterParts;
let fetching: Promise<Parts | null> | null = null;

/**
 * The parts of the page that nobody needs at first. They are fetched with the first step into the page, so that they are
 * there when they are wanted; null where they cannot be had, and then the next call tries again.
 */
export function later(): Promise<Parts | null> {
	fetching ??= import('./later-parts').catch(() => {
		fetching = null;
		return null;
	});
	return fetching;
}
