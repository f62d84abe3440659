/**
 * Where a list that opens over the page is put: into the dialog that its button stands in, else into the main part.
 * There it belongs to what it is about, and nothing around the button cuts it off.
 */
export function surroundingsOf(button: Element | null): Element | undefined {
	return button?.closest('[role="dialog"]') ?? button?.closest('main') ?? undefined;
}
