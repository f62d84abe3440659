/** Times of answers, in milliseconds. */
export interface Figures {
	count: number;
	/** Of the quickest quarter: what the work itself takes, where all else that a machine does only adds to it. */
	p25: number;
	p50: number;
	p95: number;
	max: number;
}

/** @param times in any order, at least one */
export function figuresOf(times: readonly number[]): Figures {
	const sorted = times.toSorted((a, b) => a - b);
	const at = (share: number) => sorted[Math.min(sorted.length - 1, Math.floor(sorted.length * share))] ?? 0;
	return { count: sorted.length, p25: at(0.25), p50: at(0.5), p95: at(0.95), max: sorted.at(-1) ?? 0 };
}

export function shown(name: string, { count, p25, p50, p95, max }: Figures): string {
	const ms = (value: number) => `${value.toFixed(1)} ms`;
	const spread = `${ms(p25)} in the quickest quarter, ${ms(p50)} in the middle, ${ms(p95)} at 95 %, ${ms(max)} at most`;
	return `${name.padEnd(34)} ${count} answers, ${spread}`;
}

/** Do something many times, so many at once, and say how long each took. @throws what the work throws */
export async function timed(
	count: number,
	atOnce: number,
	work: (n: number) => Promise<void>
): Promise<number[]> {
	const times: number[] = [];
	let next = 0;
	const one = async () => {
		while (next < count) {
			const n = next;
			next += 1;
			const started = performance.now();
			await work(n);
			times.push(performance.now() - started);
		}
	};
	await Promise.all(Array.from({ length: atOnce }, one));
	return times;
}
