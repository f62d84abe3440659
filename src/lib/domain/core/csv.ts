/** What a spreadsheet would take for a formula, and carry out. */
const FORMULA = /^[=+\-@\t\r]/;

/**
 * Rows as a table for spreadsheets (RFC 4180): lines end with CR and LF, what holds a comma, a quote or a line break
 * stands in quotes, and what would be a formula is kept from being one.
 */
export function csvOf(rows: readonly (readonly (string | number | null)[])[]): string {
	return rows.map((row) => `${row.map(cellOf).join(',')}\r\n`).join('');
}

function cellOf(value: string | number | null): string {
	const text = value === null ? '' : String(value);
	const harmless = typeof value === 'string' && FORMULA.test(text) ? `'${text}` : text;
	return /[",\r\n]/.test(harmless) ? `"${harmless.replaceAll('"', '""')}"` : harmless;
}
