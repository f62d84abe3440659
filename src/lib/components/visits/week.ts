import { addDays, localDateOf, WEEKDAYS, type LocalDate, type Zone } from '$lib/domain/core/time';
import type { VisitItem } from '$lib/domain/visits/views';

/** A day with the visits that begin on it. */
export interface DayOfVisits {
	date: LocalDate;
	visits: VisitItem[];
}

/** The seven days from a Monday, each with its visits, in the hospital's calendar. */
export function weekOf(monday: LocalDate, visits: readonly VisitItem[], zone: Zone): DayOfVisits[] {
	return WEEKDAYS.map((_, index) => {
		const date = addDays(monday, index);
		const onDay = visits.filter(({ startsAt }) => localDateOf(Date.parse(startsAt), zone) === date);
		return { date, visits: onDay };
	});
}
