/** A point of a series. `x` and `y` are in the units of the plot; `moment` says in words when it was. */
export interface PlotPoint {
	readonly x: number;
	readonly y: number;
	readonly moment: string;
	/** What the rules made of it: its mark changes, and the words say so. */
	readonly verdict?: 'caution' | 'stop' | null;
	/** The limits that judged it, in words, for the table. */
	readonly limits?: string;
}

/** What is measured again and again. The points of one run are joined by a line; between runs there is none. */
export interface PlotSeries {
	readonly key: string;
	readonly label: string;
	readonly mark: MarkShape;
	readonly runs: readonly (readonly PlotPoint[])[];
}

/** The shape of a series' marks, so that two series are told apart without colour. */
export type MarkShape = 'disc' | 'ring' | 'square';

/** A limit holds over a stretch, because it may follow the base of each session. */
export interface PlotLimit {
	readonly from: number;
	readonly to: number;
	readonly y: number;
	readonly label: string;
	/** A caution is drawn in dots, a stop in dashes. */
	readonly grade?: 'caution' | 'stop';
}

/** Something that happened between the readings: the operation, a move, a clearance. */
export interface PlotEvent {
	readonly x: number;
	readonly label: string;
}

/** A name on the x axis. */
export interface PlotTick {
	readonly x: number;
	readonly label: string;
}

/** The smallest and the largest value that are drawn. */
export interface Range {
	readonly from: number;
	readonly to: number;
}

const STEPS = [1, 2, 5, 10];

/** Every value a plot must have room for. */
export function valuesOf(series: readonly PlotSeries[], limits: readonly PlotLimit[]): number[] {
	const measured = series.flatMap(({ runs }) => runs.flatMap((run) => run.map(({ y }) => y)));
	return [...measured, ...limits.map(({ y }) => y)];
}

/**
 * Round numbers around the values, about `count` of them: 1, 2 or 5 times a power of ten apart. A single value
 * still gets room above and below it; no values give 0 and 1.
 */
export function niceTicks(values: readonly number[], count = 4): number[] {
	const { from: low, to: high } = withRoom(values.length > 0 ? values : [0, 1]);
	const step = niceStep((high - low) / count);
	const first = Math.floor(low / step);
	const last = Math.max(first + 1, Math.ceil(high / step));
	return Array.from({ length: last - first + 1 }, (_, index) => tidy((first + index) * step));
}

/** From the least to the largest; a value that stands alone gets a tenth of itself, at least 1, around it. */
function withRoom(values: readonly number[]): Range {
	const [low, high] = [Math.min(...values), Math.max(...values)];
	const room = low === high ? Math.max(1, Math.abs(low) / 10) / 2 : 0;
	return { from: low - room, to: high + room };
}

/** The least of 1, 2, 5, 10 times a power of ten that is not under `raw`. */
function niceStep(raw: number): number {
	const power = 10 ** Math.floor(Math.log10(raw));
	const factor = STEPS.find((each) => each * power >= raw * (1 - 1e-9)) ?? 10;
	return factor * power;
}

/** Without the binary noise of a multiplication: 0.30000000000000004 is 0.3. */
function tidy(value: number): number {
	return Number(value.toPrecision(12));
}

/** Where a value stands in a range, 0 to 1. A range without width puts everything in its middle. */
export function share(value: number, { from, to }: Range): number {
	return to === from ? 0.5 : (value - from) / (to - from);
}

/**
 * Heights at which labels can be read: each as near to where it belongs as the others allow, in the given order
 * of size, at least `gap` apart and inside `0` to `height`.
 */
export function spread(wanted: readonly number[], gap: number, height: number): number[] {
	const order = wanted.map((y, index) => ({ y, index })).sort((a, b) => a.y - b.y);
	const placed = new Array<number>(wanted.length).fill(0);
	let floor = 0;
	for (const { y, index } of order) {
		placed[index] = Math.max(y, floor);
		floor = (placed[index] ?? 0) + gap;
	}
	let ceiling = height;
	for (const { index } of order.reverse()) {
		placed[index] = Math.min(placed[index] ?? 0, ceiling);
		ceiling = (placed[index] ?? 0) - gap;
	}
	return placed;
}

/** All points in the order in which the arrow keys visit them: by time, then by series. */
export function inOrder(series: readonly PlotSeries[]): { series: PlotSeries; point: PlotPoint }[] {
	return series
		.flatMap((each) => each.runs.flatMap((run) => run.map((point) => ({ series: each, point }))))
		.sort((a, b) => a.point.x - b.point.x);
}

/** The place an arrow key leads to from `at`, or the same where there is none. */
export function nextPoint(at: number, key: string, count: number): number | null {
	const to: Record<string, number> = {
		ArrowRight: at + 1,
		ArrowLeft: at - 1,
		Home: 0,
		End: count - 1
	};
	const wanted = to[key];
	return wanted === undefined ? null : Math.min(Math.max(wanted, 0), count - 1);
}
