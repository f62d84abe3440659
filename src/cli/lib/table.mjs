/**
 * A plain table of steps with their counts and durations.
 * @param {{ name: string, counts: import('./counts.mjs').Counts, ms: number, note: string }[]} results
 */
export function tableOf(results) {
	const head = ['step', 'passed', 'failed', 'skipped', 'seconds', ''];
	const rows = results.map(({ name, counts, ms, note }) => [
		name,
		String(counts.passed),
		String(counts.failed),
		String(counts.skipped),
		(ms / 1000).toFixed(1),
		note
	]);
	const widths = head.map((_, column) =>
		Math.max(...[head, ...rows].map((row) => (row[column] ?? '').length))
	);
	return [head, ...rows]
		.map((row) =>
			row
				.map((cell, column) => pad(cell, widths[column] ?? 0, column))
				.join('  ')
				.trimEnd()
		)
		.join('\n');
}

/**
 * Names and notes stand to the left, numbers to the right.
 * @param {string} cell
 * @param {number} width
 * @param {number} column
 */
function pad(cell, width, column) {
	return column === 0 || column === 5 ? cell.padEnd(width) : cell.padStart(width);
}
