/**
 * A rope of three strands, as paths. Strand i at distance s along the axis stands at
 * `A sin(2 pi s / P + 2 pi i / 3)` across it, and is in front where the cosine is positive. Each strand is cut
 * where the cosine changes sign; one cut runs from one edge of the rope to the other.
 */
import { round } from './strands';

/** How a rope is laid: half width of the path, length of one turn, thickness of a strand, all in px. */
export type Lay = { amplitude: number; period: number; stroke: number };

/** The ropes of the product: down a thread, along a patient's corridor, along a lane of the ward, beside the name. */
export const LAYS = {
	thread: { amplitude: 9.5, period: 58, stroke: 10.5 },
	corridor: { amplitude: 6.6, period: 41, stroke: 7.2 },
	lane: { amplitude: 4.2, period: 26, stroke: 4.6 },
	mark: { amplitude: 3.6, period: 22, stroke: 4 }
} as const satisfies Record<string, Lay>;
export type LayName = keyof typeof LAYS;

/** One visible or hidden half turn of a strand: from `from` to `to` along the axis, towards `side` (1 or -1). */
export type HalfTurn = { strand: number; front: boolean; from: number; to: number; side: 1 | -1 };

/** Paths of one strand; every half turn of a layer is a move and a curve of the same `d`. */
export type StrandPaths = { back: string; front: string };

/**
 * The half turns that a rope of `length` px shows, ordered along each strand. The first and the last may
 * stand out over the ends; the drawing clips them.
 */
export function halfTurns(length: number, lay: Lay): HalfTurn[] {
	return [0, 1, 2].flatMap((strand) => halfTurnsOf(strand, length, lay.period));
}

function halfTurnsOf(strand: number, length: number, period: number): HalfTurn[] {
	const half = period / 2;
	// The phase is -pi/2, where the cosine turns positive and the strand leaves the near edge, at this distance.
	const start = -period / 4 - (strand * period) / 3;
	const first = Math.floor(-start / half);
	const last = Math.ceil((length - start) / half);
	return Array.from({ length: last - first }, (_, index) => {
		const turn = first + index;
		const front = turn % 2 === 0;
		return { strand, front, from: start + turn * half, to: start + (turn + 1) * half, side: front ? 1 : -1 };
	});
}

/**
 * Handles of a cubic curve that follows half a sine wave between its turning points, as a share of its length:
 * (pi - 2) / pi makes the slope in the middle right; the curve then stays within 1 % of the amplitude.
 */
const HANDLE = (Math.PI - 2) / Math.PI;

type Axis = 'down' | 'along';

function curve(turn: HalfTurn, lay: Lay, axis: Axis): string {
	const across = lay.amplitude * turn.side;
	const reach = (turn.to - turn.from) * HANDLE;
	const point = (x: number, s: number) =>
		axis === 'down' ? `${round(x)} ${round(s)}` : `${round(s)} ${round(x)}`;
	return (
		`M${point(-across, turn.from)}` +
		`C${point(-across, turn.from + reach)} ${point(across, turn.to - reach)} ${point(across, turn.to)}`
	);
}

const laid = new Map<string, readonly StrandPaths[]>();

/**
 * Paths of the three strands of a rope `length` px long, with its axis at 0 and its beginning at 0. Laid once
 * per kind, length and direction and kept, because a ward shows sixty of them.
 *
 * @throws RangeError when the length is not a number from 0 to 100 000 px
 */
export function layRope(kind: LayName, length: number, axis: Axis): readonly StrandPaths[] {
	if (!(length >= 0 && length <= 100_000)) {
		throw new RangeError(`length of a rope is ${length} px; it must be from 0 to 100000 px`);
	}
	const key = `${kind} ${axis} ${Math.round(length)}`;
	const known = laid.get(key);
	if (known) {
		return known;
	}
	const paths = drawStrands(Math.round(length), LAYS[kind], axis);
	forgetOldest();
	laid.set(key, paths);
	return paths;
}

function drawStrands(length: number, lay: Lay, axis: Axis): StrandPaths[] {
	const turns = halfTurns(length, lay);
	const layer = (strand: number, front: boolean) =>
		turns
			.filter((turn) => turn.strand === strand && turn.front === front)
			.map((turn) => curve(turn, lay, axis))
			.join('');
	return [0, 1, 2].map((strand) => ({ back: layer(strand, false), front: layer(strand, true) }));
}

const KEPT_ROPES = 200;

/** A thread grows by an entry at a time, so lengths vary without end; the memory must not. */
function forgetOldest(): void {
	if (laid.size < KEPT_ROPES) {
		return;
	}
	for (const oldest of laid.keys()) {
		laid.delete(oldest);
		return;
	}
}

/** Half the width that a rope covers, from its axis to its edge, in px. */
export function halfWidth(lay: Lay): number {
	return lay.amplitude + lay.stroke / 2;
}

/** Four slightly slanted turns of twine round a rope `reach` px to either side, around `at` along the axis. */
export function whipping(at: number, reach: number, axis: Axis = 'down'): string {
	const gap = reach / 4;
	const slant = reach / 6;
	return [-1.5, -0.5, 0.5, 1.5]
		.map((step) => {
			const [from, to] = [at + step * gap + slant / 2, at + step * gap - slant / 2];
			return axis === 'down'
				? `M${round(-reach)} ${round(from)}L${round(reach)} ${round(to)}`
				: `M${round(from)} ${round(-reach)}L${round(to)} ${round(reach)}`;
		})
		.join('');
}
