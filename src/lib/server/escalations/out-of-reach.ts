import { and, eq } from 'drizzle-orm';
import { can } from '$lib/domain/access/can';
import { isSoughtAnew } from '$lib/domain/escalations/holding';
import { m } from '$lib/i18n/paraglide/messages';
import { loadPerson } from '../auth/people';
import type { Context } from '../context';
import type { Tx } from '../db';
import { escalations, users } from '../db/schema';
import type { Change } from '../write';
import { entriesFor, escalationEvents } from './follow';
import { recordMove } from './moves';
import { placeOf, startChain, type EscalationRow } from './tell';

/**
 * Calls whose holder may not see them any more, because their account was disabled or they have left the unit: each
 * is sought anew in the transaction that took it out of their reach. Nobody else could act on it before.
 * @param userId whose account has changed; call it after the change
 */
export async function seekForHolder(tx: Tx, context: Context, userId: string): Promise<Change<null>[]> {
	const held = await tx
		.select()
		.from(escalations)
		.where(and(eq(escalations.takenBy, userId), eq(escalations.state, 'taken')));
	const changes: Change<null>[] = [];
	for (const row of held) {
		if (await isOutOfReach(tx, row)) {
			changes.push(await seekAnew(tx, context, row));
		}
	}
	return changes;
}

/** Does somebody have it who may not take it where the patient lies now, and is nobody else sought yet? */
export async function isOutOfReach(tx: Tx, row: EscalationRow): Promise<boolean> {
	if (row.state !== 'taken' || row.takenBy === null || isSoughtAnew(row)) {
		return false;
	}
	const holder = await loadPerson(tx, row.takenBy);
	const { unitId } = await placeOf(tx, row.episodeId);
	return holder === null || !can(holder, 'escalation.take', { unitId });
}

/**
 * Start the chain beside a holder who cannot act: from its first step, because nobody knows of it whom they could
 * have told. They stay the holder until another takes it; whether they came to where the patient was is past. One
 * who gets the unit or the account back may take it anew.
 */
export async function seekAnew(tx: Tx, context: Context, row: EscalationRow): Promise<Change<null>> {
	const { id, episodeId, takenBy } = row;
	const sought = { ...row, arrivedAt: null, askHolderAt: null, holderAskedAt: null };
	const { arrivedAt, askHolderAt, holderAskedAt } = sought;
	await tx.update(escalations).set({ arrivedAt, askHolderAt, holderAskedAt }).where(eq(escalations.id, id));
	await recordMove(tx, context, id, 'out-of-reach', { to: takenBy });
	const messages = await startChain(tx, sought, 0, context.now);
	const words = m.escalations_entry_out_of_reach({ name: await nameOf(tx, takenBy) });
	return {
		result: null,
		audit: { action: 'escalation.out-of-reach', objectKind: 'escalation', objectId: id, episodeId },
		entries: await entriesFor(tx, row, 'event', words, { strand: 'nursing' }),
		events: await escalationEvents(tx, row, 'out-of-reach'),
		messages
	};
}

/** By the account and not by {@link loadPerson}: a disabled one has its name still. */
async function nameOf(tx: Tx, userId: string | null): Promise<string> {
	const [user] = userId === null ? [] : await tx.select().from(users).where(eq(users.id, userId));
	return user?.name ?? '';
}
