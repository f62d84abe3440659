import { and, eq, inArray, isNull } from 'drizzle-orm';
import type { CloseReason } from '$lib/domain/core/codes';
import { Problem } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import { accessEpisode } from '../access/access';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { episodes, escalations } from '../db/schema';
import { endVisits } from '../visits/end-all';
import { tellDischarge } from '../visits/notify';
import { bringing, write, type Change, type Written } from '../write';
import { refuseClosed } from './move';
import { endPlacement } from './place';

/**
 * Close a stay: the patient has left and the bed is free. Everything about it stays on record and readable; what
 * is asked and not answered stays a loose end of whoever owes it. Visits ahead end with it, unless the patient goes
 * home to come back to them.
 * @param reason one of the closed list; it goes into the audit, so it is a code and no prose
 * @throws Problem `wrong-state` when it is closed already, or while a call for help is open: somebody may be on
 * their way to that bed
 */
export function closeEpisode(
	context: PersonContext,
	episodeId: string,
	reason: CloseReason
): Promise<Written<{ id: string; closedAt: string }>> {
	return write(context, 'episode.close', async (tx) => {
		const episode = await accessEpisode(tx, context.actor, episodeId, 'episode.close');
		refuseClosed(episode);
		await refuseOpenCall(tx, episodeId);
		await tx
			.update(episodes)
			.set({ closedAt: context.now, closedFor: reason })
			.where(and(eq(episodes.id, episodeId), isNull(episodes.closedAt)));
		await endPlacement(tx, episodeId, context.now);
		const messages = await tellDischarge(tx, episodeId, context.actor.id, reason, context.now);
		const ended = await endVisits(tx, context, episodeId, reason);
		const change = {
			result: { id: episodeId, closedAt: toRfc3339(context.now) },
			audit: {
				action: 'episode.closed',
				objectKind: 'episode',
				objectId: episodeId,
				episodeId,
				detail: { reason }
			},
			events: [{ topic: 'episode', kind: 'closed', id: episodeId, episodeId }],
			messages
		} satisfies Change<{ id: string; closedAt: string }>;
		return bringing(change, ended);
	});
}

async function refuseOpenCall(tx: Tx, episodeId: string): Promise<void> {
	const [open] = await tx
		.select({ id: escalations.id, state: escalations.state })
		.from(escalations)
		.where(and(eq(escalations.episodeId, episodeId), inArray(escalations.state, ['raised', 'taken'])));
	if (open) {
		throw new Problem('wrong-state', 'A call for help about this patient is open: settle it first.', {
			state: open.state,
			escalationId: open.id
		});
	}
}
