/** Open the folds that something stands in: what a form has come back to say must not be hidden behind them. */
export function unfold(element: Element): void {
	for (let fold = element.closest('details'); fold; fold = fold.parentElement?.closest('details') ?? null) {
		fold.open = true;
	}
}
