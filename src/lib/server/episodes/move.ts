import { and, eq, isNull } from 'drizzle-orm';
import { Problem } from '$lib/domain/core/errors';
import { spellingKey } from '$lib/domain/episodes/identifiers';
import type { MoveInput } from '$lib/domain/episodes/forms';
import { accessEpisode, type EpisodeRow } from '../access/access';
import { resolveAnyUnit } from '../access/units';
import type { PersonContext } from '../context';
import { episodes } from '../db/schema';
import { followPatient } from '../escalations/follow-patient';
import { write, type Written } from '../write';
import { phaseIn, placeIn, recordPlacement } from './place';

/** Where the patient is after a move. */
export interface Moved {
	id: string;
	unit: string;
	unitId: string;
	bed: string | null;
}

/**
 * Move a patient to another bed or unit; to a gym means into the outpatient programme. The episode goes on, where
 * it was before stays on record, and an open call for help follows. Any unit can be named: a patient who gets
 * worse goes where those who send them do not belong.
 * @throws Problem `bed-in-use`; `invalid` for a ward without a bed; `wrong-state` when closed or
 * there already
 */
export function movePatient(
	context: PersonContext,
	episodeId: string,
	input: MoveInput
): Promise<Written<Moved>> {
	return write(context, 'episode.move', async (tx) => {
		const episode = await accessEpisode(tx, context.actor, episodeId, 'episode.move');
		refuseClosed(episode);
		const place = await placeIn(tx, await resolveAnyUnit(tx, input.unit, '/unit'), input.bed, episodeId);
		const { unit, bed } = place;
		if (unit.id === episode.unitId && spellingKey(bed ?? '') === spellingKey(episode.bed ?? '')) {
			throw new Problem('wrong-state', 'The patient is there already.', { unit: unit.name, bed });
		}
		await tx
			.update(episodes)
			.set({ unitId: unit.id, bed, phase: phaseIn(unit) })
			.where(and(eq(episodes.id, episodeId), isNull(episodes.closedAt)));
		await recordPlacement(tx, episodeId, place, context.now);
		const calls = await followPatient(tx, context, episodeId, { left: episode.unitId, now: unit.id });
		const moved = { topic: 'episode', kind: 'moved', id: episodeId, episodeId } as const;
		return {
			result: { id: episodeId, unit: unit.name, unitId: unit.id, bed },
			audit: [
				{
					action: 'episode.moved',
					objectKind: 'episode',
					objectId: episodeId,
					episodeId,
					detail: { fromUnit: episode.unitId, fromBed: episode.bed, toUnit: unit.id, toBed: bed }
				},
				...calls.audit.flat()
			],
			entries: calls.entries,
			// Those whom the patient left must hear it too: else they go on seeing somebody who is gone.
			events: [
				...[...new Set([episode.unitId, unit.id])].map((unitId) => ({ ...moved, unitId })),
				...calls.events
			],
			messages: calls.messages
		};
	});
}

/** @throws Problem `wrong-state` with when it was closed */
export function refuseClosed(episode: EpisodeRow): void {
	if (episode.closedAt !== null) {
		throw new Problem('wrong-state', 'The episode is closed: its patient lies nowhere.', { state: 'closed' });
	}
}
