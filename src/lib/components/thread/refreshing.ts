import type { FormOptions } from 'sveltekit-superforms';

/**
 * Options of a form whose page keeps itself fresh: nothing is loaded anew, and `onchange` is told of every answer,
 * because a refusal also means that what is on screen may be old.
 */
export function refreshing<T extends Record<string, unknown>>(onchange: () => void): FormOptions<T, string> {
	return { invalidateAll: false, onUpdated: () => onchange() };
}
