import type { QueryClient } from '@tanstack/svelte-query';
import { staleKeys, type QueryKey, type StreamEvent } from '$lib/domain/live/events';

/** Events within this time are answered by one round of refetching. */
const GATHER_MS = 120;

/**
 * Turn live events into refetches: an event names the answers that it makes stale, several in a row are gathered,
 * and only what is on screen is fetched again.
 */
export function refresher(client: QueryClient): { heard(event: StreamEvent): void; everything(): void } {
	const stale = new Map<string, QueryKey>();
	let timer: ReturnType<typeof setTimeout> | null = null;
	const flush = () => {
		timer = null;
		for (const queryKey of stale.values()) {
			void client.invalidateQueries({ queryKey });
		}
		stale.clear();
	};
	return {
		heard(event) {
			for (const key of staleKeys(event)) {
				stale.set(key.join('/'), key);
			}
			timer ??= setTimeout(flush, GATHER_MS);
		},
		everything() {
			void client.invalidateQueries();
		}
	};
}
