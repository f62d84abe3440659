/**
 * The strands of the rope: which dye and which yarn stands for which discipline. Colour never speaks alone, so
 * each has a yarn pattern of its own: solid, even, dotted, dash and dot.
 */
export const STRAND_DYES = {
	medical: 'woad',
	nursing: 'moss',
	therapy: 'heather',
	patient: 'hemp-ink'
} as const;
export type StrandName = keyof typeof STRAND_DYES;

/** All of them, as they are named to a reader. */
export const STRANDS = ['medical', 'nursing', 'therapy', 'patient'] as const satisfies readonly StrandName[];

/** Laid in this order; the patient's hemp is no strand of the laid rope, but has loose ends like everybody. */
export const LAID_STRANDS = ['medical', 'nursing', 'therapy'] as const satisfies readonly StrandName[];

/** Yarn of each strand as dash lengths in multiples of the yarn's width; empty is a solid line. */
const YARNS: Record<StrandName, readonly number[]> = {
	medical: [],
	nursing: [4, 3.4],
	therapy: [0.1, 2.9],
	patient: [4.4, 2.6, 0.1, 2.6]
};

/** CSS colour of a strand. */
export function dyeOf(strand: StrandName): string {
	return `color-mix(in oklab, var(--${STRAND_DYES[strand]}), var(--shade) var(--dim))`;
}

/** `stroke-dasharray` of a strand's yarn drawn `width` px wide, or `null` for a solid line. */
export function yarnOf(strand: StrandName, width: number): string | null {
	const dashes = YARNS[strand];
	return dashes.length === 0 ? null : dashes.map((dash) => round(dash * width)).join(' ');
}

/** A tenth of a pixel is finer than the eye at any zoom of a page, and keeps the markup short. */
export function round(value: number): number {
	return Math.round(value * 10) / 10;
}

/** The far side of a strand: its dye, darkened by `share` percent towards what the theme calls shade. */
export function shadedDye(strand: StrandName, share: number): string {
	return `color-mix(in oklab, var(--${STRAND_DYES[strand]}), var(--shade) ${share}%)`;
}
