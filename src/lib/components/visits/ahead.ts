import { localDateOf } from '$lib/domain/core/time';
import type { VisitItem } from '$lib/domain/visits/views';
import type { Reader } from '$lib/format';
import { m } from '$lib/i18n/paraglide/messages';

/** A part of a patient's visits under its heading. */
export interface VisitsPart {
	title: string;
	visits: VisitItem[];
}

/**
 * The visits from today on, the next one first, then those of earlier days, the last one first. What waits for
 * a new time stands ahead however long ago it was. A part without visits is left out.
 * @param visits oldest first
 */
export function aheadAndPast(visits: readonly VisitItem[], { now, zone }: Reader): VisitsPart[] {
	const today = localDateOf(now, zone);
	const isAhead = (visit: VisitItem) =>
		visit.wantsFollowUp || localDateOf(Date.parse(visit.startsAt), zone) >= today;
	const parts = [
		{ title: m.visits_ahead(), visits: visits.filter(isAhead) },
		{ title: m.visits_past(), visits: visits.filter((visit) => !isAhead(visit)).toReversed() }
	];
	return parts.filter((part) => part.visits.length > 0);
}
