import { exact } from '../numbers';

/** A limit as it stood beside one value of one reading: a change counts from its base. */
export interface Bar {
	readonly grade: 'stop' | 'caution';
	readonly value: number;
	/** Crossed from below; else from above. */
	readonly up: boolean;
	/** The limit itself already counts. */
	readonly including: boolean;
}

export function barAt(grade: Bar['grade'], value: number, up: boolean, including: boolean): Bar {
	return { grade, value: exact(value), up, including };
}

/** True when the value lies beyond the bar. */
export function isBeyond({ value, up, including }: Bar, measured: number): boolean {
	const over = up ? exact(measured) - value : value - exact(measured);
	return including ? over >= 0 : over > 0;
}

/** The first bar met each way, of each grade; a caution that lies beyond its stop is never met. */
export function nearest(bars: readonly Bar[]): Bar[] {
	return [true, false].flatMap((up) => {
		const [stop] = inOrder(bars, up, 'stop');
		const [caution] = inOrder(bars, up, 'caution');
		const first = caution && (!stop || (up ? caution.value < stop.value : caution.value > stop.value));
		return [...(stop ? [stop] : []), ...(first ? [caution] : [])];
	});
}

function inOrder(bars: readonly Bar[], up: boolean, grade: Bar['grade']): Bar[] {
	const same = bars.filter((bar) => bar.up === up && bar.grade === grade);
	return same.sort(
		(a, b) => (up ? a.value - b.value : b.value - a.value) || Number(b.including) - Number(a.including)
	);
}
