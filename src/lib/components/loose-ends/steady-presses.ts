/** How long a list must have stood still before a press on it counts, in ms. */
const STEADY_MS = 400;

/** When the rows of each list last changed places, on the page's own clock; a list that never did is not there. */
const movedAt = new WeakMap<Element, { order: string; at: number }>();

/**
 * Rows that arrive live push others from under the finger, and a press would then take the wrong escalation.
 * Presses by pointer within a blink of such a change are dropped; keys know their row and always count.
 *
 * @param order names the rows in the order in which they stand
 */
export function steadyPresses(order: string): (list: HTMLElement) => () => void {
	return (list) => {
		const before = movedAt.get(list);
		const at = before && before.order !== order ? performance.now() : (before?.at ?? -Infinity);
		movedAt.set(list, { order, at });
		const guard = (event: MouseEvent) => {
			if (isTooSoon(event, at)) {
				event.preventDefault();
				event.stopPropagation();
			}
		};
		list.addEventListener('click', guard, { capture: true });
		return () => list.removeEventListener('click', guard, { capture: true });
	};
}

/** A click that no pointer made has a `detail` of 0. */
export function isTooSoon(
	{ detail, timeStamp }: Pick<MouseEvent, 'detail' | 'timeStamp'>,
	at: number
): boolean {
	return detail > 0 && timeStamp - at < STEADY_MS;
}
