/** Where loose ends hang from a lane, and where their words stand. */
import { frayedEnd } from '../rope/ends';
import { round } from '../rope/strands';

/** More would make one patient as tall as three; the rest is counted. */
export const MOST_SHOWN = 3;

/** From one end's words to the next, and from one strand to the next, in px. */
const ROW = 17;
const APART = 13;
/** Room that the hairs of an end need left of it, and from its tip to its words, in px. */
const MARGIN = 6;
const TO_WORDS = 9;
/** How far below the floor the first one ends, in px. */
const BELOW = 7;
/** Width of a letter of the words, in px: what they need is guessed, because nothing is measured on a server. */
const LETTER = 6.3;
/** How far before its whipping the rope lets the last one go, in px. */
const BEFORE = 14;
/** How much further back an end may hang so that its words fit on its right, before they go to its left, in px. */
const YIELDS = 24;

export interface HungEnd {
	/** The strand, from within the rope to its tip. */
	d: string;
	hairs: string;
	/** Where its words begin, or end where they stand on its left, on their baseline. */
	x: number;
	y: number;
	anchor: 'start' | 'end';
}

export interface Room {
	/** Length of the rope, in px. */
	laid: number;
	/** Where the drawing ends; no words go beyond it as long as they are shorter than it. */
	width: number;
	/** Where the rope lies, and where the corridor's floor does, in px from the top. */
	axis: number;
	floor: number;
}

/**
 * The ends at the level reached, each with its words on its right where they fit before the drawing ends, else on its
 * left. Words on the right: the first end hangs furthest along and shortest, each later one further back and longer;
 * on the left it is the other way round. So no strand crosses the words of another.
 *
 * @param lengths how many letters the words of each have; 0 where they stand elsewhere. At most `MOST_SHOWN` are drawn
 */
export function hang(lengths: readonly number[], room: Room): HungEnd[] {
	const shown = lengths.slice(0, MOST_SHOWN);
	const needs = shown.map((letters) => (letters === 0 ? 0 : letters * LETTER + TO_WORDS + 2));
	const last = Math.max(room.laid - BEFORE, MARGIN + (shown.length - 1) * APART);
	const first = last - (shown.length - 1) * APART;
	const fitsRight = needs.every((need, index) => last - index * APART + need <= room.width + YIELDS);
	const fitsLeft = needs.every((need, index) => first + index * APART >= need);
	if (!fitsRight && fitsLeft) {
		return shown.map((letters, index) => hung(first + index * APART, index, letters, 'end', room));
	}
	let limit = last;
	return shown.map((letters, index) => {
		const least = MARGIN + (shown.length - 1 - index) * APART;
		const x = Math.max(least, Math.min(limit, room.width - (needs[index] ?? 0)));
		limit = x - APART;
		return hung(x, index, letters, 'start', room);
	});
}

function hung(
	x: number,
	index: number,
	letters: number,
	anchor: HungEnd['anchor'],
	{ axis, floor }: Room
): HungEnd {
	const tip = { x: x + 2, s: floor + BELOW + (letters === 0 ? 0 : index * ROW) };
	const fall = tip.s - axis;
	return {
		d: `M${round(x - 1)} ${axis}C${round(x - 1)} ${round(axis + fall * 0.4)} ${round(x + 5)} ${round(axis + fall * 0.5)} ${round(tip.x)} ${round(tip.s)}`,
		hairs: frayedEnd(tip, 94, 9),
		x: round(tip.x + (anchor === 'start' ? TO_WORDS : -TO_WORDS)),
		y: tip.s + 7,
		anchor
	};
}

/** How much taller a lane is for its loose ends, in px, with their words or without. */
export function hangingHeight(count: number, words: boolean): number {
	if (count === 0) {
		return 0;
	}
	return words ? (Math.min(count, MOST_SHOWN) + (count > MOST_SHOWN ? 1 : 0)) * ROW + 2 : BELOW + 6;
}
