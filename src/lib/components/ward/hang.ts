/** Where loose ends hang from a lane, and where their words stand. */
import { frayedEnd } from '../rope/ends';
import { round } from '../rope/strands';

/** More would make one patient as tall as three; the rest is counted. */
export const MOST_SHOWN = 3;

/** From one end's words to the next, and from one strand to the next, in px. */
const ROW = 17;
const APART = 13;
/** Room that the hairs of an end need left of it, in px. */
const MARGIN = 6;

export interface HungEnd {
	/** The strand, from within the rope to its tip. */
	d: string;
	hairs: string;
	/** Where its words begin, on their baseline. */
	x: number;
	y: number;
}

/**
 * The ends, the first one furthest along and shortest, each later one further back and longer: so no strand
 * crosses the words of another.
 *
 * @param count how many hang, at most `MOST_SHOWN` are drawn
 * @param laid length of the rope, in px
 * @param share how far along the rope the first one hangs, 0 to 1
 * @param axis where the rope lies and `floor` where the corridor's floor does, in px from the top
 */
export function hang(count: number, laid: number, share: number, axis: number, floor: number): HungEnd[] {
	const shown = Math.min(count, MOST_SHOWN);
	const first = Math.max(laid * share, MARGIN + (shown - 1) * APART);
	return Array.from({ length: shown }, (_, index) => {
		const x = first - index * APART;
		const tip = { x: x + 2, s: floor + 7 + index * ROW };
		const fall = tip.s - axis;
		return {
			d: `M${round(x - 1)} ${axis}C${round(x - 1)} ${round(axis + fall * 0.4)} ${round(x + 5)} ${round(axis + fall * 0.5)} ${round(tip.x)} ${round(tip.s)}`,
			hairs: frayedEnd(tip, 94, 9),
			x: round(tip.x + 9),
			y: tip.s + 7
		};
	});
}

/** How much taller a lane is for its loose ends, in px. */
export function hangingHeight(count: number): number {
	return count === 0 ? 0 : (Math.min(count, MOST_SHOWN) + (count > MOST_SHOWN ? 1 : 0)) * ROW + 2;
}
