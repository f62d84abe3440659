/** Nine decimals are far below what any instrument shows and far above what binary fractions get wrong. */
const PLACES = 1e9;

/**
 * A computed number without the noise of binary fractions, so that 91.6 - 82 is 9.6 and meets a limit of 80 % of
 * 12. Without this a value exactly at a limit falls on either side of it by chance.
 */
export function exact(value: number): number {
	return Math.round(value * PLACES) / PLACES;
}

/** A number for a sentence: at most three decimals, no trailing zeros. */
export function plain(value: number): string {
	return String(Math.round(value * 1000) / 1000);
}
