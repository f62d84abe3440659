/** Strands that leave the rope: an ask goes out, comes back with its answer, or hangs frayed until it does. */
import { round } from './strands';

/** A point beside the rope: `x` px to its right, `s` px down from its beginning. */
export type Point = { x: number; s: number };

/** How far an answered ask bends out from the axis, in px, however far away the answer is. */
const BOW = 56;

/** How far an open ask reaches out from the axis, and how far it sinks, in px. */
const REACH: Point = { x: 62, s: 15 };

/** Four short hairs that spread from `tip`, `length` px long, around the direction `degrees` below the level. */
export function frayedEnd(tip: Point, degrees: number, length = 12): string {
	return [-27, -9, 9, 27]
		.map((spread, index) => {
			const angle = ((degrees + spread) * Math.PI) / 180;
			// Uneven lengths, because a frayed end is.
			const reach = length * (index % 2 === 0 ? 0.86 : 1);
			const end = { x: tip.x + reach * Math.cos(angle), s: tip.s + reach * Math.sin(angle) };
			return `M${round(tip.x)} ${round(tip.s)}L${round(end.x)} ${round(end.s)}`;
		})
		.join('');
}

/** The way of an answered ask: out of the rope at `from`, back into it at `to` px down the rope. */
export function answeredWay(from: number, to: number): string {
	const fall = to - from;
	const lead = Math.min(26, fall / 3);
	return (
		`M0 ${round(from)}` +
		`C${round(BOW * 0.62)} ${round(from)} ${BOW} ${round(from + lead * 0.4)} ${BOW} ${round(from + lead * 1.1)}` +
		`C${BOW} ${round(from + lead * 2)} ${round(BOW * 0.62)} ${round(to)} 0 ${round(to)}`
	);
}

/** The way of an open ask, and the hairs it ends in. */
export function openWay(from: number): { d: string; hairs: string } {
	const tip = { x: REACH.x, s: from + REACH.s };
	const d = `M0 ${round(from)}C${round(tip.x * 0.4)} ${round(from - 1)} ${round(tip.x * 0.7)} ${round(from + 5)} ${tip.x} ${round(tip.s)}`;
	return { d, hairs: frayedEnd(tip, 24) };
}
