import type SavedPart from './Saved.svelte';

type Saved = typeof SavedPart;
let fetching: Promise<Saved | null> | null = null;

/**
 * What the page shows once a session is on record. It is fetched apart, because nobody needs it at first; null where
 * it cannot be had, and then the next call tries again.
 */
export function savedPage(): Promise<Saved | null> {
	fetching ??= import('./Saved.svelte').then(
		(part) => part.default,
		() => {
			fetching = null;
			return null;
		}
	);
	return fetching;
}
