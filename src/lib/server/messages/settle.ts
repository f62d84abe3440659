import { eq } from 'drizzle-orm';
import { can } from '$lib/domain/access/can';
import { Problem, notFound } from '$lib/domain/core/errors';
import { accessEpisode } from '../access/access';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { inboundMessages, outbox } from '../db/schema';
import { episodeOfMessage, newestEpisode } from '../outbox/change';
import { write, type Written } from '../write';

/** Who books visits keeps the contacts, and sees to what a text could not do. */
const PERMISSION = 'visit.plan';

/** A message that did not arrive is seen to: the person was called, or it does not matter any more. */
export function settleMessage(context: PersonContext, id: string): Promise<Written<{ id: string }>> {
	return write(context, PERMISSION, async (tx) => {
		const [row] = await tx.select().from(outbox).where(eq(outbox.id, id));
		const episodeId = row ? await episodeOfMessage(tx, row) : null;
		// What goes to accounts is the administrator's.
		await requireAccess(tx, context, row !== undefined && row.refKind !== 'account', episodeId);
		const failed = row?.state === 'failed' || row?.state === 'undelivered';
		if (!row || !failed || row.handledAt !== null) {
			throw new Problem('wrong-state', 'Nothing waits to be seen to about this message.', {
				state: row?.state
			});
		}
		await tx
			.update(outbox)
			.set({ handledAt: context.now, handledBy: context.actor.id })
			.where(eq(outbox.id, id));
		return settled('message', id, episodeId);
	});
}

/** A text that no rule understood was read and answered by a person. */
export function settleInbound(context: PersonContext, id: string): Promise<Written<{ id: string }>> {
	return write(context, PERMISSION, async (tx) => {
		const [row] = await tx.select().from(inboundMessages).where(eq(inboundMessages.id, id));
		const patientId = row?.patientId ?? null;
		const episodeId = patientId === null ? null : await newestEpisode(tx, patientId);
		await requireAccess(tx, context, row !== undefined, episodeId);
		if (row?.handledAt != null) {
			throw new Problem('wrong-state', 'Somebody has seen to this text already.', { state: 'handled' });
		}
		await tx
			.update(inboundMessages)
			.set({ handledAt: context.now, handledBy: context.actor.id })
			.where(eq(inboundMessages.id, id));
		return settled('inbound', id, episodeId);
	});
}

/** What belongs to no patient is anybody's who may see to it at all. */
async function requireAccess(
	tx: Tx,
	{ actor }: PersonContext,
	exists: boolean,
	episodeId: string | null
): Promise<void> {
	if (!exists || !can(actor, PERMISSION)) {
		throw notFound('message');
	}
	if (episodeId !== null) {
		await accessEpisode(tx, actor, episodeId, PERMISSION);
	}
}

function settled(objectKind: 'message' | 'inbound', id: string, episodeId: string | null) {
	return {
		result: { id },
		audit: { action: 'message.settled' as const, objectKind, objectId: id, episodeId },
		events: [{ topic: 'message' as const, kind: 'settled', id, episodeId }]
	};
}
