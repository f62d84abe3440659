/** Whether there is room for a visit: nobody is in two places at once, and a place holds so many at a time. */
import { MINUTE, type Instant } from '../core/time';

/** A stretch of time that somebody is expected for. */
export interface Stretch {
	readonly startsAt: Instant;
	readonly minutes: number;
}

/** A visit that is on the books already. */
export interface Held extends Stretch {
	readonly patientId: string;
	readonly unitId: string;
}

export interface Wanted {
	readonly patientId: string;
	readonly unitId: string;
	/** How many patients the unit holds at a time; null where nobody has said. */
	readonly places: number | null;
	readonly visits: readonly Stretch[];
}

/** What stands in the way of one of the wanted visits. */
export type Clash<H extends Held = Held> =
	| { readonly kind: 'overlaps'; readonly wanted: Stretch; readonly held: H }
	| { readonly kind: 'full'; readonly wanted: Stretch; readonly taken: number };

/** The first of the wanted visits for which there is no room, and why; null when all of them fit. */
export function firstClash<H extends Held>(wanted: Wanted, held: readonly H[]): Clash<H> | null {
	for (const visit of wanted.visits) {
		const meanwhile = held.filter((other) => overlap(visit, other));
		const own = meanwhile.find(({ patientId }) => patientId === wanted.patientId);
		if (own) {
			return { kind: 'overlaps', wanted: visit, held: own };
		}
		const here = meanwhile.filter(({ unitId }) => unitId === wanted.unitId);
		const taken = mostAtOnce(visit, here);
		if (wanted.places !== null && taken >= wanted.places) {
			return { kind: 'full', wanted: visit, taken };
		}
	}
	return null;
}

/** Two visits overlap where they share a moment; one that begins as the other ends does not. */
export function overlap(a: Stretch, b: Stretch): boolean {
	return a.startsAt < endOf(b) && b.startsAt < endOf(a);
}

/** When a visit is over. */
export function endOf({ startsAt, minutes }: Stretch): Instant {
	return startsAt + minutes * MINUTE;
}

/** How many of `others` are there at the busiest moment of a stretch: at its beginning, or when one of them begins. */
function mostAtOnce(stretch: Stretch, others: readonly Stretch[]): number {
	const moments = [stretch.startsAt, ...others.map(({ startsAt }) => startsAt)];
	const within = moments.filter((at) => at >= stretch.startsAt && at < endOf(stretch));
	const counts = within.map((at) => others.filter((one) => one.startsAt <= at && at < endOf(one)).length);
	return Math.max(...counts);
}
