import { and, eq, gt, isNull } from 'drizzle-orm';
import type { CloseReason } from '$lib/domain/core/codes';
import { isNobodyTold } from '$lib/domain/episodes/close-reasons';
import { isExpected } from '$lib/domain/visits/states';
import { m } from '$lib/i18n/paraglide/messages';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { patientLinks, visits } from '../db/schema';
import type { Change } from '../write';
import { moveVisit } from './move';

/** Somebody goes home to come back to their visits; in every other case there is nothing to come to. */
const VISITS_STAND: readonly CloseReason[] = ['home'];

/**
 * What the end of a stay does to the visits ahead: they are cancelled, what waits to be sent about them is dropped,
 * and the patient is told where there is somebody to tell. The link to the patient's page ends with them. The thread
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
		.where(and(eq(visits.episodeId, episodeId), gt(visits.startsAt, now)));
	const changes: Change<unknown>[] = [];
	for (const visit of ahead.filter(({ state }) => isExpected(state))) {
		const change = await moveVisit(tx, visit, 'cancel', 'staff', now, m.visits_stay_over());
		const messages = isNobodyTold(reason) ? [] : (change.messages ?? []);
		changes.push({ ...change, entries: [], messages });
	}
	await tx
		.update(patientLinks)
		.set({ revokedAt: now, revokedBy: actor.id })
		.where(and(eq(patientLinks.episodeId, episodeId), isNull(patientLinks.revokedAt)));
	return changes;
}
