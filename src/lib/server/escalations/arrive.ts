import { eq } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { askHolderAt, isSoughtAnew } from '$lib/domain/escalations/holding';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEscalation } from '../access/access';
import type { Context, PersonContext } from '../context';
import type { Tx } from '../db';
import { escalations } from '../db/schema';
import { write, type Change, type Written } from '../write';
import { moved, type Moved } from './follow';
import { NOBODY_SOUGHT, requireOnTheWay } from './held';
import { recordMove } from './moves';
import { stopAlerts, type EscalationRow } from './tell';

/** The holder is at the bedside. */
export function arriveAtEscalation(context: PersonContext, id: string): Promise<Written<Moved>> {
	return write(context, 'escalation.take', async (tx) => {
		const { escalation } = await accessEscalation(tx, context.actor, id, 'escalation.take');
		return arrive(tx, context, context.actor, escalation);
	});
}

/**
 * {@link arriveAtEscalation} inside a transaction. Nobody is asked or sought any more: somebody is there.
 * @throws Problem `wrong-state` for who is there already
 */
export async function arrive(
	tx: Tx,
	context: Context,
	person: Person,
	row: EscalationRow
): Promise<Change<Moved>> {
	requireOnTheWay(row, person, 'arrive');
	await tx
		.update(escalations)
		.set({ arrivedAt: context.now, ...NOBODY_SOUGHT })
		.where(eq(escalations.id, row.id));
	await recordMove(tx, context, row.id, 'arrived');
	await stopAlerts(tx, row.id, 'at the bedside');
	return moved(tx, row, 'taken', 'escalation.arrived', 'arrived', m.escalations_entry_arrived());
}

/** In how many minutes the holder will be at the bedside: given after taking, or given anew. */
export function giveEtaOf(context: PersonContext, id: string, minutes: number): Promise<Written<Moved>> {
	return write(context, 'escalation.take', async (tx) => {
		const { escalation } = await accessEscalation(tx, context.actor, id, 'escalation.take');
		return giveEta(tx, context, context.actor, escalation, minutes);
	});
}

/**
 * {@link giveEtaOf} inside a transaction. A holder who was asked has answered with it, as long as the chain has
 * not gone on; from then on only being there, or another taker, stops it.
 */
export async function giveEta(
	tx: Tx,
	context: Context,
	person: Person,
	row: EscalationRow,
	minutes: number
): Promise<Change<Moved>> {
	requireOnTheWay(row, person, 'eta');
	const { now } = context;
	const timers = isSoughtAnew(row)
		? {}
		: { askHolderAt: askHolderAt(row.grade, now, minutes, row.neededBy), holderAskedAt: null };
	await tx
		.update(escalations)
		.set({ etaMinutes: minutes, etaGivenAt: now, ...timers })
		.where(eq(escalations.id, row.id));
	await recordMove(tx, context, row.id, 'eta', { etaMinutes: minutes });
	return moved(tx, row, 'taken', 'escalation.eta-given', 'eta', m.escalations_entry_eta({ minutes }));
}
