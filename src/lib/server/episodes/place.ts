import { and, desc, eq, gt, isNull, lte, ne } from 'drizzle-orm';
import { Problem, invalidField } from '$lib/domain/core/errors';
import { written } from '$lib/domain/episodes/identifiers';
import type { EpisodeRow } from '../access/access';
import type { Tx } from '../db';
import { episodes, placements, units } from '../db/schema';
import { newId } from '../ids';
import { isBed } from './spelt';

export type UnitRow = typeof units.$inferSelect;

/** Where a patient is from a moment on: in a bed, or without one in a gym. */
export interface Place {
	unit: UnitRow;
	/** In the form in which it is stored; null in a gym, unless its places have names. */
	bed: string | null;
}

/**
 * The place that is meant by a unit and what was typed as its bed.
 * @param episodeId whose place it is to be: their own bed is not in use by somebody else; null for a new stay
 * @throws Problem `invalid` for a ward without a bed, `bed-in-use`
 */
export async function placeIn(
	tx: Tx,
	unit: UnitRow,
	typed: string | null | undefined,
	episodeId: string | null
): Promise<Place> {
	const bed = written(typed ?? '');
	if (bed === '' && unit.kind === 'gym') {
		return { unit, bed: null };
	}
	if (bed === '') {
		throw invalidField('/bed', `The bed is empty: ${unit.name} has beds.`);
	}
	await refuseUsedBed(tx, unit, bed, episodeId);
	return { unit, bed };
}

async function refuseUsedBed(tx: Tx, unit: UnitRow, bed: string, episodeId: string | null): Promise<void> {
	const [used] = await tx
		.select({ id: episodes.id })
		.from(episodes)
		.where(
			and(
				eq(episodes.unitId, unit.id),
				isBed(episodes.bed, bed),
				isNull(episodes.closedAt),
				episodeId === null ? undefined : ne(episodes.id, episodeId)
			)
		);
	if (used) {
		throw new Problem('bed-in-use', `Bed ${bed} of ${unit.name} is in use.`, { episodeId: used.id });
	}
}

/** Put on record from when the patient is where; the placement before ends then. */
export async function recordPlacement(tx: Tx, episodeId: string, place: Place, now: number): Promise<void> {
	await endPlacement(tx, episodeId, now);
	await tx
		.insert(placements)
		.values({ id: newId(), episodeId, unitId: place.unit.id, bed: place.bed, fromAt: now });
}

/** The patient is there no longer. */
export async function endPlacement(tx: Tx, episodeId: string, now: number): Promise<void> {
	await tx
		.update(placements)
		.set({ untilAt: now })
		.where(and(eq(placements.episodeId, episodeId), isNull(placements.untilAt)));
}

/** A gym is where outpatients come to; everybody with a bed is in hospital. */
export function phaseIn(unit: UnitRow): 'inpatient' | 'outpatient' {
	return unit.kind === 'gym' ? 'outpatient' : 'inpatient';
}

/** The unit and the phase of a stay at an instant, as the record has them: a session may be entered after a move. */
export async function whereAt(
	tx: Tx,
	{ id, unitId, phase }: Pick<EpisodeRow, 'id' | 'unitId' | 'phase'>,
	at: number
): Promise<Pick<EpisodeRow, 'unitId' | 'phase'>> {
	const [left] = await tx
		.select({ unit: units })
		.from(placements)
		.innerJoin(units, eq(units.id, placements.unitId))
		.where(and(eq(placements.episodeId, id), lte(placements.fromAt, at), gt(placements.untilAt, at)))
		.orderBy(desc(placements.fromAt))
		.limit(1);
	return left ? { unitId: left.unit.id, phase: phaseIn(left.unit) } : { unitId, phase };
}
