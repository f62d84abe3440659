import { eq, or } from 'drizzle-orm';
import { invalidField } from '$lib/domain/core/errors';
import type { LocalDate, Zone } from '$lib/domain/core/time';
import { startProblem, type BookVisits } from '$lib/domain/visits/forms';
import { planSeries, planVisit, type PlannedVisit } from '$lib/domain/visits/series';
import type { Reader } from '../db';
import { units } from '../db/schema';

/**
 * The visits that somebody wants to book, in order, in the hospital's wall time, none on a closed day.
 * @throws Problem `invalid` when the first lies in the past or the last more than two years ahead
 */
export function plannedVisits(
	input: BookVisits,
	zone: Zone,
	now: number,
	closed: ReadonlySet<LocalDate>
): PlannedVisit[] {
	const planned =
		input.kind === 'single'
			? [planVisit(input.startsAt, input.minutes, zone)]
			: planSeries(input, zone, closed);
	const pointer = input.kind === 'single' ? '/startsAt' : '/series/from';
	for (const { startsAt } of [...planned.slice(0, 1), ...planned.slice(-1)]) {
		const problem = startProblem(startsAt, now, zone);
		if (problem !== null) {
			throw invalidField(pointer, problem);
		}
	}
	return planned;
}

/** A unit as a place of visits. */
export type Place = Pick<typeof units.$inferSelect, 'id' | 'name'>;

/**
 * The unit where a visit takes place, by identifier or exact name.
 * @throws Problem `invalid` when there is none
 */
export async function findPlace(reader: Reader, place: string, pointer: string): Promise<Place> {
	const [unit] = await reader
		.select({ id: units.id, name: units.name })
		.from(units)
		.where(or(eq(units.id, place), eq(units.name, place)));
	if (!unit) {
		throw invalidField(pointer, `place is '${place}': it must be the id or the exact name of a unit.`);
	}
	return unit;
}
