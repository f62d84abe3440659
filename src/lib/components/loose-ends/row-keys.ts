/**
 * Arrow keys, Home and End move among the main controls of a list's rows, beside the order of the Tab key. A
 * control takes part when it carries `data-row-step`.
 */
export function rowKeys(list: HTMLElement): () => void {
	const move = (event: KeyboardEvent) => {
		const steps = [...list.querySelectorAll<HTMLElement>('[data-row-step]')];
		const row = event.target instanceof Element ? event.target.closest('li') : null;
		const at = steps.findIndex((step) => row?.contains(step));
		const next = at < 0 ? undefined : steps[targetOf(event.key, at, steps.length) ?? -1];
		if (next) {
			event.preventDefault();
			next.focus();
		}
	};
	list.addEventListener('keydown', move);
	return () => list.removeEventListener('keydown', move);
}

/** The row that a key leads to from row `at` of `count`; null for other keys and at the ends. */
export function targetOf(key: string, at: number, count: number): number | null {
	const next = { ArrowDown: at + 1, ArrowUp: at - 1, Home: 0, End: count - 1 }[key];
	return next === undefined || next < 0 || next >= count ? null : next;
}
