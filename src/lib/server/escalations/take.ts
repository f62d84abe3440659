import { eq } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { Problem } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import { askHolderAt, isOpenTo } from '$lib/domain/escalations/holding';
import { requireEscalationMove } from '$lib/domain/escalations/states';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEscalation } from '../access/access';
import type { Context, PersonContext } from '../context';
import type { Tx } from '../db';
import { escalations, users } from '../db/schema';
import { write, type Change, type Written } from '../write';
import { entriesFor, escalationEvents } from './follow';
import { recordMove } from './moves';
import { noticesOfTaking } from './notices';
import { leavingOf, stopAlerts, type EscalationRow } from './tell';

export interface Taken {
	id: string;
	state: 'taken';
	takenBy: { id: string; name: string };
	takenAt: string;
}

/** By which way somebody took it; it stands in the history and in the audit. */
export type TakenVia = 'page' | 'link' | 'text' | 'call';

/**
 * Take an escalation: from now on this person holds it and the chain stops. Of two who take at once one has it,
 * and the other is told who.
 * @throws Problem `already-taken` with who and when
 */
export function takeEscalation(
	context: PersonContext,
	id: string,
	etaMinutes: number | null
): Promise<Written<Taken>> {
	return write(context, 'escalation.take', async (tx) => {
		const { escalation } = await accessEscalation(tx, context.actor, id, 'escalation.take');
		return take(tx, context, context.actor, escalation, etaMinutes, 'page');
	});
}

/**
 * The taking itself, inside the transaction of whoever decided that this person may ask for it: signed in, by the
 * secret of a link, or by an answer from their telephone.
 * @throws Problem `already-taken`, `wrong-state` once it has ended, `not-allowed` for a role that takes none
 */
export async function take(
	tx: Tx,
	context: Context,
	person: Person,
	before: EscalationRow,
	etaMinutes: number | null,
	via: TakenVia
): Promise<Change<Taken>> {
	requireEscalationMove(before.state, 'take');
	if (!isOpenTo(before, person.id)) {
		throw await alreadyTaken(tx, before);
	}
	if (!can(person, 'escalation.take')) {
		throw new Problem('not-allowed', `The role ${person.role} may not take escalations.`);
	}
	const messages = await noticesOfTaking(tx, before, person, context.now);
	await tx
		.update(escalations)
		.set(heldFrom(context.now, person, before, etaMinutes))
		.where(eq(escalations.id, before.id));
	const leaving = await leavingOf(tx, before.id);
	await recordMove(tx, context, before.id, 'taken', { via, etaMinutes, before: holdOf(before), leaving });
	await stopAlerts(tx, before.id, 'taken');
	const { id, episodeId } = before;
	return {
		result: {
			id,
			state: 'taken',
			takenBy: { id: person.id, name: person.name },
			takenAt: toRfc3339(context.now)
		},
		audit: { action: 'escalation.taken', objectKind: 'escalation', objectId: id, episodeId, detail: { via } },
		entries: await entriesFor(tx, before, 'answer', takenWords(etaMinutes)),
		events: await escalationEvents(tx, before, 'taken'),
		messages
	};
}

/** The columns that taking changes, as they stood: what taking back within the moment puts back. */
export type Hold = Pick<
	EscalationRow,
	| 'state'
	| 'takenBy'
	| 'takenAt'
	| 'etaMinutes'
	| 'etaGivenAt'
	| 'arrivedAt'
	| 'askHolderAt'
	| 'holderAskedAt'
	| 'passTo'
	| 'passReason'
	| 'nextStepAt'
>;

function holdOf(row: EscalationRow): Hold {
	const { state, takenBy, takenAt, etaMinutes, etaGivenAt, arrivedAt } = row;
	const { askHolderAt, holderAskedAt, passTo, passReason, nextStepAt } = row;
	return {
		state,
		takenBy,
		takenAt,
		etaMinutes,
		etaGivenAt,
		arrivedAt,
		askHolderAt,
		holderAskedAt,
		passTo,
		passReason,
		nextStepAt
	};
}

/** A holder who takes a graver grade anew may stand at the bedside already. */
function heldFrom(now: number, person: Person, before: EscalationRow, etaMinutes: number | null): Hold {
	const arrivedAt = before.takenBy === person.id ? before.arrivedAt : null;
	return {
		state: 'taken',
		takenBy: person.id,
		takenAt: now,
		etaMinutes,
		etaGivenAt: etaMinutes === null ? null : now,
		arrivedAt,
		askHolderAt: arrivedAt === null ? askHolderAt(before.grade, now, etaMinutes, before.neededBy) : null,
		holderAskedAt: null,
		passTo: null,
		passReason: null,
		nextStepAt: null
	};
}

function takenWords(etaMinutes: number | null): string {
	return etaMinutes === null
		? m.escalations_entry_taken()
		: m.escalations_entry_taken_eta({ minutes: etaMinutes });
}

async function alreadyTaken(tx: Tx, escalation: EscalationRow): Promise<Problem> {
	const [holder] = await tx
		.select({ id: users.id, name: users.name })
		.from(users)
		.where(eq(users.id, escalation.takenBy ?? ''));
	const takenAt = toRfc3339(escalation.takenAt ?? escalation.raisedAt);
	return new Problem('already-taken', `${holder?.name ?? 'Somebody'} has it since ${takenAt}.`, {
		state: escalation.state,
		takenBy: holder ?? null,
		takenAt
	});
}
