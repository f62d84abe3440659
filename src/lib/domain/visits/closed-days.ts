/** Days on which the hospital receives no visits. */
import type { LocalDate } from '../core/time';

/** Why a visit cannot be on that day. */
export function closedDayProblem(date: LocalDate, name: string): string {
	return `${date} is a closed day (${name}): choose another day.`;
}
