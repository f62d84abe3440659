/** The lines of a text that is typed one line in a row; empty rows are none. */
export function rowsOf(text: string): string[] {
	return text
		.split('\n')
		.map((line) => line.trim())
		.filter((line) => line !== '');
}
