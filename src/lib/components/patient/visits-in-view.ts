import { MINUTE } from '$lib/domain/core/time';
import type { VisitLine } from '$lib/domain/episodes/views';

const SHOWN = 4;

/** The visits that are not over yet, soonest first; where there is none, the last ones, newest first. Four at most. */
export function visitsInView<V extends VisitLine>(visits: readonly V[], now: number): V[] {
	const soonestFirst = visits.toSorted((a, b) => Date.parse(a.startsAt) - Date.parse(b.startsAt));
	const ahead = soonestFirst.filter(({ startsAt, minutes }) => Date.parse(startsAt) + minutes * MINUTE > now);
	return ahead.length > 0 ? ahead.slice(0, SHOWN) : soonestFirst.slice(-SHOWN).toReversed();
}
