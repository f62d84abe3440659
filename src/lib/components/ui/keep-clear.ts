/** The bar of the frame at the top, the board below it, and what stays above the thumb. */
type Bar = '--shell-bar' | '--board' | '--foot';

/**
 * Tells the page how tall a bar is that stays in view, px, however many lines its words take: `app.css` keeps what the
 * keyboard reaches clear of it. Answers the function that takes it back, as an effect wants it.
 */
export function keepClear(bar: Bar, height: number): () => void {
	const { style } = document.documentElement;
	if (height > 0) {
		style.setProperty(bar, `${height}px`);
	}
	return () => style.removeProperty(bar);
}
