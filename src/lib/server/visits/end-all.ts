import { and, asc, eq, gt, inArray, isNull } from 'drizzle-orm';
import type { CloseReason } from '$lib/domain/core/codes';
import { isNobodyTold } from '$lib/domain/episodes/close-reasons';
import { isExpected } from '$lib/domain/visits/states';
import { m } from '$lib/i18n/paraglide/messages';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { patientLinks, visits } from '../db/schema';
import type { NewMessage } from '../outbox/enqueue';
import type { Change } from '../write';
import type { EpisodeRow } from '../access/access';
import { moveVisit } from './move';
import { patientOfEpisode } from './remind';
import { tellAllCancelled } from './tell-patient';
import { NOTHING_TO_TELL } from './untold';

/** Somebody goes home to come back to their visits; in every other case there is nothing to come to. */
const VISITS_STAND: readonly CloseReason[] = ['home'];
/** Whether visits are booked in a stay, and shown to its patient: also after they went home to come back to them. */
export function takesVisits({ closedAt, closedFor }: Pick<EpisodeRow, 'closedAt' | 'closedFor'>): boolean {
	return closedAt === null || (closedFor !== null && VISITS_STAND.includes(closedFor));
}

/**
 * What the end of a stay does to the visits ahead: they are cancelled, what waits to be sent about them is dropped,
 * and the patient is told, once of all of them, where there is somebody to tell. The link to the patient's page ends with them. The thread
 * tells of the end of the stay, not of each of thirty-six visits.
 */
export async function endVisits(
	tx: Tx,
	{ now, actor }: PersonContext,
	episodeId: string,
	reason: CloseReason
): Promise<Change<unknown>[]> {
	if (VISITS_STAND.includes(reason)) {
		return [];
	}
	const ahead = await tx
		.select()
		.from(visits)
		.where(and(eq(visits.episodeId, episodeId), gt(visits.startsAt, now)))
		.orderBy(asc(visits.startsAt));
	const changes: Change<unknown>[] = [];
	const expected = ahead.filter(({ state }) => isExpected(state)).map(({ id }) => id);
	for (const visit of ahead.filter(({ id }) => expected.includes(id))) {
		const change = await moveVisit(tx, visit, 'cancel', 'staff', now, m.visits_stay_over());
		changes.push({ ...change, entries: [], messages: [] });
	}
	if (!isNobodyTold(reason)) {
		const last = changes.at(-1);
		changes.splice(
			-1,
			1,
			...(last ? [{ ...last, messages: await tellOnce(tx, episodeId, expected, now) }] : [])
		);
	}
	// Of all of them one thing is to be told, where there is somebody to tell.
	const told = isNobodyTold(reason) ? expected : expected.slice(1);
	await tx.update(visits).set(NOTHING_TO_TELL).where(inArray(visits.id, told));
	await tx
		.update(patientLinks)
		.set({ revokedAt: now, revokedBy: actor.id })
		.where(and(eq(patientLinks.episodeId, episodeId), isNull(patientLinks.revokedAt)));
	return changes;
}

/** The message to the patient, joined to the last of the cancellations so that it is written with them. */
async function tellOnce(tx: Tx, episodeId: string, ids: string[], now: number): Promise<NewMessage[]> {
	const cancelled = await tx
		.select()
		.from(visits)
		.where(inArray(visits.id, ids))
		.orderBy(asc(visits.startsAt), asc(visits.id));
	return tellAllCancelled(cancelled, await patientOfEpisode(tx, episodeId), now);
}
