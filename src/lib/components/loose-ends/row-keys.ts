import { catchFocus } from '$lib/components/ui/focus-lost';

/**
 * Arrow keys, Home and End move among the main controls of a list's rows, beside the order of the Tab key. A
 * control takes part when it carries `data-row-step`. From a row itself, where the focus is caught, down leads to its
 * own control first.
 */
export function rowKeys(list: HTMLElement): () => void {
	const move = (event: KeyboardEvent) => {
		const steps = [...list.querySelectorAll<HTMLElement>('[data-row-step]')];
		const row = event.target instanceof Element ? event.target.closest('li') : null;
		const at = steps.findIndex((step) => row?.contains(step));
		const from = event.target === row && event.key === 'ArrowDown' ? at - 1 : at;
		const next = at < 0 ? undefined : steps[targetOf(event.key, from, steps.length) ?? -1];
		if (next) {
			event.preventDefault();
			next.focus();
		}
	};
	list.addEventListener('keydown', move);
	return () => list.removeEventListener('keydown', move);
}

/** Which row of the list has the focus; -1 for none. */
export function rowInFocus(list: HTMLElement | null): number {
	return rowsOf(list).findIndex((row) => row.contains(document.activeElement));
}

/**
 * A row goes when its deed is done, by oneself or by a colleague, and takes the focus with it. The row that stands in
 * its place is given it, and not that row's control: a key that is pressed once more must not do the next thing too.
 */
export function catchInRows(list: HTMLElement | null, at: number): void {
	if (at >= 0) {
		const rows = rowsOf(list);
		catchFocus(rows[at] ?? rows.at(-1) ?? list);
	}
}

const rowsOf = (list: HTMLElement | null) => [...(list?.querySelectorAll<HTMLElement>('li') ?? [])];

/** The row that a key leads to from row `at` of `count`; null for other keys and at the ends. */
export function targetOf(key: string, at: number, count: number): number | null {
	const next = { ArrowDown: at + 1, ArrowUp: at - 1, Home: 0, End: count - 1 }[key];
	return next === undefined || next < 0 || next >= count ? null : next;
}
