/** How long what is pressed must have stood still before a press counts, in ms. */
const STEADY_MS = 400;

/** When the parts of each element last changed places, on the page's own clock; what never did is not there. */
const movedAt = new WeakMap<Element, { order: string; at: number }>();

/**
 * Rows that arrive live push others from under the finger, and a press would then take the wrong escalation; a
 * button that gives way to another lets the second tap of a double tap press what nobody has read. Presses by pointer
 * within a blink of such a change are dropped; keys know what they press and always count.
 *
 * @param order names the rows or buttons in the order in which they stand
 */
export function steadyPresses(order: string): (element: HTMLElement) => () => void {
	return (element) => {
		const before = movedAt.get(element);
		const at = before && before.order !== order ? performance.now() : (before?.at ?? -Infinity);
		movedAt.set(element, { order, at });
		const guard = (event: MouseEvent) => {
			if (isTooSoon(event, at)) {
				event.preventDefault();
				event.stopPropagation();
			}
		};
		element.addEventListener('click', guard, { capture: true });
		return () => element.removeEventListener('click', guard, { capture: true });
	};
}

/** A click that no pointer made has a `detail` of 0. */
export function isTooSoon(
	{ detail, timeStamp }: Pick<MouseEvent, 'detail' | 'timeStamp'>,
	at: number
): boolean {
	return detail > 0 && timeStamp - at < STEADY_MS;
}
