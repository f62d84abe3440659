import type { LocalDate } from '$lib/domain/core/time';
import type { ClosedDay } from '$lib/domain/visits/views';

/** Closed days as planning asks for them. */
export function closedSet(days: readonly ClosedDay[]): ReadonlySet<LocalDate> {
	return new Set(days.map(({ date }) => date));
}

/** What a closed day is called; null for a day that is open. */
export function closedName(days: readonly ClosedDay[], date: LocalDate): string | null {
	return days.find((day) => day.date === date)?.name ?? null;
}
