import type { LayName } from '../rope/geometry';

/** How a lane is drawn, all in px: the way from one mark to the next, the rope, its axis and the floor below it. */
export interface LaneSize {
	readonly step: number;
	readonly lay: LayName;
	readonly axis: number;
	readonly floor: number;
	/** Height of the figures above the marks. */
	readonly figure: number;
	/** Thickness of a loose end. */
	readonly end: number;
	/** Width and height of one of the four stairs. */
	readonly stair: readonly [number, number];
	/** Whether the words of loose ends stand in the drawing, or below it where there is no room. */
	readonly words: boolean;
}

export const LANE_SIZES = {
	/** One row of the ward. */
	row: { step: 52, lay: 'lane', axis: 24, floor: 36, figure: 11, end: 5, stair: [10, 6], words: true },
	/** The same on a narrow screen. */
	small: { step: 34, lay: 'lane', axis: 24, floor: 36, figure: 11, end: 5, stair: [9, 6], words: false },
	/** Across the page of one patient. */
	page: { step: 112, lay: 'corridor', axis: 34, floor: 52, figure: 15, end: 8, stair: [20, 10], words: true },
	/** The same on a phone. */
	phone: { step: 46, lay: 'corridor', axis: 32, floor: 48, figure: 13, end: 7, stair: [14, 8], words: false }
} as const satisfies Record<string, LaneSize>;
export type LaneSizeName = keyof typeof LANE_SIZES;

/** What the stairs need beyond the last mark, in px. */
export const beyond = ({ stair }: LaneSize): number => 6 + stair[0] * 4 + 2;

/** What a part of a lane is called on a page where it is drawn once for all lanes. */
export const modelOf = (part: 'corridor' | 'rope', size: LaneSizeName, level: number): string =>
	`lane-${part}-${size}-${level}`;
