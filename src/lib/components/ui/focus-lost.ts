/**
 * Where a press has taken its own button away, the focus falls to the page itself and a keyboard begins anew at its
 * top. Then what became of the press takes the focus; where somebody has gone on meanwhile, theirs is left alone.
 */
export function catchFocus(outcome: HTMLElement | null): void {
	const { activeElement, body } = document;
	if (activeElement === null || activeElement === body) {
		outcome?.focus({ preventScroll: true });
	}
}

/** How many pictures of the screen what closes has to give the focus back, or to lose it: about half a second. */
const MOMENTS = 30;

/** As `catchFocus`, for what closes over the page: once it is gone, and what it was opened from may be gone with it. */
export function catchFocusAfter(landing: string, moments = MOMENTS): void {
	requestAnimationFrame(() => {
		catchFocus(document.getElementById(landing));
		if (moments > 1) {
			catchFocusAfter(landing, moments - 1);
		}
	});
}
