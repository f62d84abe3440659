import { and, eq } from 'drizzle-orm';
import { isInError } from '$lib/domain/bedside/amended';
import type { AmendSession } from '$lib/domain/bedside/amendments';
import { invalidField, Problem } from '$lib/domain/core/errors';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEpisode } from '../access/access';
import { threadForDeed } from '../access/thread';
import type { PersonContext } from '../context';
import { bedsideSessions, sessionAmendments } from '../db/schema';
import { newId } from '../ids';
import { write, type Written } from '../write';

/**
 * Say more about a session that is on record, or that it was entered in error: for the wrong patient, or twice. What
 * it says itself is never changed. Only who recorded it can say that it was an error.
 * @throws Problem `invalid` for a session of another stay; `wrong-state` for one in error already
 */
export function amendSession(
	context: PersonContext,
	episodeId: string,
	{ sessionId, kind, body }: AmendSession
): Promise<Written<{ id: string }>> {
	return write(context, 'session.record', async (tx) => {
		await accessEpisode(tx, context.actor, episodeId, 'session.record');
		const [session] = await tx
			.select()
			.from(bedsideSessions)
			.where(and(eq(bedsideSessions.id, sessionId), eq(bedsideSessions.episodeId, episodeId)));
		if (!session) {
			throw invalidField('/sessionId', `sessionId ${sessionId} is no session of this episode.`);
		}
		const amendments = await tx
			.select({ kind: sessionAmendments.kind })
			.from(sessionAmendments)
			.where(eq(sessionAmendments.sessionId, sessionId));
		if (isInError({ amendments })) {
			throw new Problem('wrong-state', 'This session is marked as entered in error already.', {
				state: 'entered-in-error'
			});
		}
		if (kind === 'entered-in-error' && session.recordedBy !== context.actor.id) {
			throw new Problem('not-allowed', 'Only who recorded a session can say that it was entered in error.');
		}
		const id = newId();
		await tx
			.insert(sessionAmendments)
			.values({ id, sessionId, kind, body, byId: context.actor.id, at: context.now });
		const threadId = await threadForDeed(tx, episodeId, context.actor);
		const words = kind === 'amended' ? m.bedside_entry_amended({ body }) : m.bedside_entry_in_error({ body });
		return {
			result: { id },
			audit: { action: `session.${kind}`, objectKind: 'session', objectId: sessionId, episodeId },
			entries: threadId
				? [{ threadId, kind: 'event', body: words, ref: { kind: 'session', id: sessionId } }]
				: [],
			events: [{ topic: 'session', kind, id: sessionId, episodeId }]
		};
	});
}
