import { and, desc, eq, inArray, ne, or } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { Problem } from '$lib/domain/core/errors';
import { UNDO_MS } from '$lib/domain/escalations/holding';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEscalation } from '../access/access';
import type { Context, PersonContext } from '../context';
import type { Tx } from '../db';
import { escalationLinks, escalationMoves, escalations, outbox } from '../db/schema';
import { NOT_WAITING } from '../outbox/verdict';
import { write, type Change, type Written } from '../write';
import { moved, type Moved } from './follow';
import { recordMove } from './moves';
import { stopNotices } from './notices';
import type { Hold } from './take';
import type { EscalationRow } from './tell';

/**
 * Take a slip of the thumb back, within five seconds: everything is as it was before, and the chain goes on.
 * @throws Problem `wrong-state` when it is later, or when something has happened since
 */
export function untakeEscalation(context: PersonContext, id: string): Promise<Written<Moved>> {
	return write(context, 'escalation.take', async (tx) => {
		const { escalation } = await accessEscalation(tx, context.actor, id, 'escalation.take');
		return untake(tx, context, context.actor, escalation);
	});
}

/** {@link untakeEscalation} inside a transaction, for a person who is known already. */
export async function untake(
	tx: Tx,
	context: Context,
	person: Person,
	row: EscalationRow
): Promise<Change<Moved>> {
	const { id, takenAt } = row;
	if (row.state !== 'taken' || row.takenBy !== person.id || takenAt === null) {
		throw new Problem('wrong-state', 'You do not have this escalation.', { state: row.state });
	}
	if (context.now - takenAt > UNDO_MS) {
		const detail = `Taking can be taken back for ${UNDO_MS / 1000} seconds. Pass it on instead.`;
		throw new Problem('wrong-state', detail, { state: row.state });
	}
	const { before, leaving } = await takingOf(tx, row);
	await tx.update(escalations).set(before).where(eq(escalations.id, id));
	await recordMove(tx, context, id, 'untaken');
	await resumeAlerts(tx, context, row, leaving);
	await freeLink(tx, row, person);
	return moved(tx, row, before.state, 'escalation.untaken', 'untaken', m.escalations_entry_untaken());
}

/** What the taking put on record: how it stood before, and which messages were on their way out. */
type Taking = { before: Hold; leaving: string[] };

/** The taking, which must be the newest thing that happened. */
async function takingOf(tx: Tx, row: EscalationRow): Promise<Taking> {
	const [newest] = await tx
		.select({ kind: escalationMoves.kind, detail: escalationMoves.detail })
		.from(escalationMoves)
		.where(and(eq(escalationMoves.escalationId, row.id), ne(escalationMoves.kind, 'eta')))
		.orderBy(desc(escalationMoves.at), desc(escalationMoves.id))
		.limit(1);
	const taking = newest?.kind === 'taken' ? (newest.detail as Partial<Taking> | null) : null;
	const before = taking?.before;
	if (!before || (before.state === 'raised' && (await anotherUntaken(tx, row)))) {
		throw new Problem('wrong-state', 'Something has happened since. Pass it on instead.', {
			state: row.state
		});
	}
	return { before, leaving: taking?.leaving ?? [] };
}

/** A patient has one untaken escalation at most; a new call has come meanwhile, and tells the same people. */
async function anotherUntaken(tx: Tx, { episodeId }: EscalationRow): Promise<boolean> {
	const [other] = await tx
		.select({ id: escalations.id })
		.from(escalations)
		.where(and(eq(escalations.episodeId, episodeId), eq(escalations.state, 'raised')));
	return other !== undefined;
}

/**
 * What the taking has stopped goes out after all: what had not left, and what a worker had in hand and then let go
 * because somebody had the call. What was skipped for another reason stays so.
 */
async function resumeAlerts(
	tx: Tx,
	{ now }: Context,
	row: EscalationRow,
	leaving: readonly string[]
): Promise<void> {
	const stopped = and(eq(outbox.state, 'cancelled'), eq(outbox.stateReason, 'taken'));
	const letGo = and(
		inArray(outbox.id, [...leaving]),
		eq(outbox.state, 'skipped'),
		eq(outbox.stateReason, NOT_WAITING)
	);
	await stopNotices(tx, row.id);
	await tx
		.update(outbox)
		.set({ state: 'ready', stateReason: null, nextAt: now })
		.where(and(eq(outbox.kind, 'escalation'), eq(outbox.refId, row.id), or(stopped, letGo)));
}

/** The link that took works once more. */
async function freeLink(tx: Tx, row: EscalationRow, person: Person): Promise<void> {
	await tx
		.update(escalationLinks)
		.set({ usedAt: null })
		.where(
			and(
				eq(escalationLinks.escalationId, row.id),
				eq(escalationLinks.userId, person.id),
				eq(escalationLinks.usedAt, row.takenAt ?? 0)
			)
		);
}
