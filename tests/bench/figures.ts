/** The value below which that share of the values lies, the nearest rank. */
export function percentile(values: readonly number[], share: number): number {
	const sorted = [...values].sort((a, b) => a - b);
	return sorted[Math.max(0, Math.ceil(share * sorted.length) - 1)] ?? Number.NaN;
}

/** One line of the table: what was measured, its figures in milliseconds, and whether it holds its limit. */
export function line(
	name: string,
	values: readonly number[],
	limit?: { share: number; ms: number }
): boolean {
	const [half, most] = [percentile(values, 0.5), percentile(values, 0.95)];
	const holds = limit === undefined || percentile(values, limit.share) <= limit.ms;
	const words = limit ? `limit ${limit.ms.toFixed(0)} ms ${holds ? 'held' : 'NOT HELD'}` : '';
	const figures = [half, most].map((each) => each.toFixed(1).padStart(8)).join(' ');
	console.log(`${name.padEnd(52)} ${String(values.length).padStart(5)} ${figures}  ${words}`);
	return holds;
}
