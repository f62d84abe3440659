import { and, eq, gt, inArray, lt, or } from 'drizzle-orm';
import { Problem } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import { MINUTE } from '$lib/domain/core/time';
import { MINUTES_MAX } from '$lib/domain/visits/limits';
import { endOf, firstClash, type Held, type Stretch } from '$lib/domain/visits/room';
import type { PlannedVisit } from '$lib/domain/visits/series';
import type { Tx } from '../db';
import { episodes, settings, visits } from '../db/schema';
import { env } from '../env';
import type { Place } from './plan';
import { whenOf } from './words';

/**
 * The setting that holds the places of units at a time, by unit: `{ [unitId]: number }`. A unit without one takes
 * any number: a figure nobody has decided must not turn a patient away.
 */
export const PLACES_SETTING = 'visits.places';

/**
 * Refuse visits for which there is no room.
 * @param movedId the visit that moves, which is not in its own way
 * @throws Problem `visit-overlaps` with the patient's other visit, `place-full` with how many are there; both say when
 */
export async function requireRoom(
	tx: Tx,
	patientId: string,
	place: Place,
	planned: readonly PlannedVisit[],
	now: number,
	movedId: string | null = null
): Promise<void> {
	const places = await placesOf(tx, place);
	const around = await heldAround(tx, patientId, place.id, planned);
	const held = around.filter(({ id }) => id !== movedId);
	const clash = firstClash({ patientId, unitId: place.id, places, visits: planned }, held);
	if (clash === null) {
		return;
	}
	const zone = env().hospital.zone;
	const kept = movedId === null ? 'Nothing was booked.' : 'The visit stays as it was.';
	const startsAt = toRfc3339(clash.wanted.startsAt);
	if (clash.kind === 'overlaps') {
		const other = {
			id: clash.held.id,
			startsAt: toRfc3339(clash.held.startsAt),
			minutes: clash.held.minutes
		};
		const when = whenOf({ startsAt: clash.held.startsAt, zone }, now);
		const detail = `This patient has a visit of ${other.minutes} minutes already, ${when}. ${kept}`;
		throw new Problem('visit-overlaps', detail, { startsAt, other });
	}
	const when = whenOf({ startsAt: clash.wanted.startsAt, zone }, now);
	const detail = `${place.name} holds ${places} at a time, and ${clash.taken} are booked ${when}. ${kept}`;
	throw new Problem('place-full', detail, { startsAt, places, taken: clash.taken });
}

async function placesOf(tx: Tx, { id }: Place): Promise<number | null> {
	const [row] = await tx.select().from(settings).where(eq(settings.key, PLACES_SETTING));
	const set = (row?.value as Record<string, unknown> | undefined)?.[id];
	return typeof set === 'number' ? set : null;
}

/** The expected visits of the patient, and of the unit, that could touch one of those planned. */
async function heldAround(
	tx: Tx,
	patientId: string,
	unitId: string,
	planned: readonly Stretch[]
): Promise<(Held & { id: string })[]> {
	const from = Math.min(...planned.map(({ startsAt }) => startsAt)) - MINUTES_MAX * MINUTE;
	const to = Math.max(...planned.map(endOf));
	return tx
		.select({
			id: visits.id,
			startsAt: visits.startsAt,
			minutes: visits.minutes,
			unitId: visits.unitId,
			patientId: episodes.patientId
		})
		.from(visits)
		.innerJoin(episodes, eq(episodes.id, visits.episodeId))
		.where(
			and(
				inArray(visits.state, ['planned', 'confirmed']),
				gt(visits.startsAt, from),
				lt(visits.startsAt, to),
				or(eq(visits.unitId, unitId), eq(episodes.patientId, patientId))
			)
		);
}
