import { and, eq, isNull } from 'drizzle-orm';
import { Problem, invalidField } from '$lib/domain/core/errors';
import { accessEpisode, type EpisodeRow } from '../access/access';
import { resolveUnit } from '../access/units';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { episodes, placements, type units } from '../db/schema';
import { newId } from '../ids';
import { write, type Written } from '../write';

/** Where to: a bed of a unit, or a gym, which has none: that is the outpatient programme. */
export interface NewPlace {
	/** Identifier or exact name, among the person's own units. */
	unit: string;
	bed: string | null;
}

/**
 * Move a patient to another bed or unit. The episode goes on; where it was before stays on record.
 * @throws Problem `bed-in-use`; `invalid` for a ward without a bed or a gym with one; `wrong-state` when closed
 */
export function movePatient(
	context: PersonContext,
	episodeId: string,
	place: NewPlace
): Promise<Written<{ id: string }>> {
	return write(context, 'episode.admit', async (tx) => {
		const episode = await accessEpisode(tx, context.actor, episodeId, 'episode.admit');
		if (episode.closedAt !== null) {
			throw new Problem('wrong-state', 'The episode is closed: its patient lies nowhere.', {
				state: 'closed'
			});
		}
		const unit = await resolveUnit(tx, context.actor, place.unit, '/unit');
		await checkBed(tx, episode, unit, place.bed);
		await replace(tx, episode, unit, place.bed, context.now);
		return {
			result: { id: episodeId },
			audit: { action: 'episode.moved', objectKind: 'episode', objectId: episodeId, episodeId },
			events: [{ topic: 'episode', kind: 'moved', id: episodeId, episodeId }]
		};
	});
}

type Unit = typeof units.$inferSelect;

async function checkBed(tx: Tx, episode: EpisodeRow, unit: Unit, bed: string | null): Promise<void> {
	const isGym = unit.kind === 'gym';
	if (isGym !== (bed === null)) {
		throw invalidField('/bed', isGym ? `${unit.name} has no beds.` : `bed is empty: ${unit.name} has beds.`);
	}
	if (bed === null) {
		return;
	}
	const [used] = await tx
		.select({ id: episodes.id })
		.from(episodes)
		.where(and(eq(episodes.unitId, unit.id), eq(episodes.bed, bed), isNull(episodes.closedAt)));
	if (used && used.id !== episode.id) {
		throw new Problem('bed-in-use', `Bed ${bed} of ${unit.name} is in use.`, { episodeId: used.id });
	}
}

async function replace(
	tx: Tx,
	episode: EpisodeRow,
	unit: Unit,
	bed: string | null,
	now: number
): Promise<void> {
	await tx
		.update(placements)
		.set({ untilAt: now })
		.where(and(eq(placements.episodeId, episode.id), isNull(placements.untilAt)));
	await tx
		.insert(placements)
		.values({ id: newId(), episodeId: episode.id, unitId: unit.id, bed, fromAt: now });
	await tx
		.update(episodes)
		.set({ unitId: unit.id, bed, phase: unit.kind === 'gym' ? 'outpatient' : 'inpatient' })
		.where(eq(episodes.id, episode.id));
}
