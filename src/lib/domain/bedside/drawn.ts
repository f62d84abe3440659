import type { Bar } from './rules/bar';

/** The values that are drawn over the sessions. */
export const DRAWN = ['hr', 'sbp', 'dbp', 'spo2', 'rpe'] as const;
export type Drawn = (typeof DRAWN)[number];

export interface KeptBar extends Bar {
	readonly measure: Drawn;
	/** Place of the reading in its session: 0 is the one before it, the last the one after. */
	readonly reading: number;
}
