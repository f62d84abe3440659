/** What a person typed where a number belongs. An unreadable text is never a missing number. */
export type TypedNumber = { kind: 'empty' } | { kind: 'number'; value: number } | { kind: 'unreadable' };

/** Read a number as people write it: spaces around it, a comma or a point before the decimals. */
export function readNumber(text: string): TypedNumber {
	const trimmed = text.trim();
	if (trimmed === '') {
		return { kind: 'empty' };
	}
	if (!/^[-+]?(\d+([.,]\d*)?|[.,]\d+)$/.test(trimmed)) {
		return { kind: 'unreadable' };
	}
	return { kind: 'number', value: Number(trimmed.replace(',', '.')) };
}

/**
 * The number of a text that was checked before; null for none.
 * @throws where it is unreadable: taken for none it would quietly undo what somebody meant to set
 */
export function numberOf(text: string): number | null {
	const read = readNumber(text);
	if (read.kind === 'unreadable') {
		throw new Error('A text that is no number was not checked.');
	}
	return read.kind === 'number' ? read.value : null;
}
