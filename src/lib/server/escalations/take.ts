import { and, eq, isNull } from 'drizzle-orm';
import type { LinkHolder, Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { Problem, notFound } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import { requireEscalationMove } from '$lib/domain/escalations/states';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEscalation } from '../access/access';
import { loadPerson } from '../auth/people';
import type { Context, PersonContext } from '../context';
import { db, type Reader, type Tx } from '../db';
import { escalationLinks, escalations, users } from '../db/schema';
import { linkDigest } from '../links';
import { write, type Change, type Written } from '../write';
import { recordMove } from './moves';
import { stopAlerts, type EscalationRow } from './tell';

export interface Taken {
	id: string;
	state: 'taken';
	takenBy: { id: string; name: string };
	takenAt: string;
}

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
 * Take by the secret link of an SMS, without a sign-in. The link is bound to one person, works once and for a
 * shift, and only by POST: fetching it changes nothing.
 * @throws Problem `not-found` for a link that is unknown, used, expired, or whose person may not take any more
 */
export async function takeByLink(context: Context, token: string): Promise<Written<Taken>> {
	const link = await findLink(db(), token);
	const person = link && (await loadPerson(db(), link.userId));
	if (!link || !person || link.expiresAt <= context.now) {
		throw notFound('link');
	}
	const actor: LinkHolder = { kind: 'link', person, escalationId: link.escalationId };
	return write({ ...context, actor, key: null }, 'anyone', async (tx) => {
		const { escalation } = await accessEscalation(tx, person, link.escalationId, 'escalation.take');
		const [used] = await tx
			.update(escalationLinks)
			.set({ usedAt: context.now })
			.where(and(eq(escalationLinks.id, link.id), isNull(escalationLinks.usedAt)))
			.returning({ id: escalationLinks.id });
		if (!used && escalation.takenBy !== person.id) {
			throw notFound('link');
		}
		return take(tx, { ...context, actor }, person, escalation, null, 'link');
	});
}

export async function findLink(reader: Reader, token: string) {
	const [link] = await reader
		.select()
		.from(escalationLinks)
		.where(eq(escalationLinks.tokenHash, linkDigest(token)));
	return link ?? null;
}

/**
 * The taking itself, inside a transaction of the caller's, who has fetched the row with permission.
 * @param via by which way: a page, the secret link, or a text
 * @throws Problem `already-taken` or `wrong-state`, before anything is changed
 */
export async function take(
	tx: Tx,
	context: Context,
	person: Person,
	escalation: EscalationRow,
	etaMinutes: number | null,
	via: 'page' | 'link' | 'text'
): Promise<Change<Taken>> {
	if (escalation.state === 'taken') {
		throw await alreadyTaken(tx, escalation);
	}
	requireEscalationMove(escalation.state, 'take');
	if (!can(person, 'escalation.take')) {
		throw new Problem('not-allowed', `The role ${person.role} may not take escalations.`);
	}
	await tx
		.update(escalations)
		.set({
			state: 'taken',
			takenBy: person.id,
			takenAt: context.now,
			etaMinutes,
			nextStep: null,
			nextStepAt: null
		})
		.where(eq(escalations.id, escalation.id));
	await recordMove(tx, context, escalation.id, 'taken', { via, etaMinutes });
	await stopAlerts(tx, escalation.id, 'taken');
	const { id, episodeId, threadId } = escalation;
	const body =
		etaMinutes === null
			? m.escalations_entry_taken()
			: m.escalations_entry_taken_eta({ minutes: etaMinutes });
	return {
		result: {
			id,
			state: 'taken',
			takenBy: { id: person.id, name: person.name },
			takenAt: toRfc3339(context.now)
		},
		audit: { action: 'escalation.taken', objectKind: 'escalation', objectId: id, episodeId, detail: { via } },
		entries: threadId ? [{ threadId, kind: 'answer', body, ref: { kind: 'escalation', id } }] : [],
		events: [{ topic: 'escalation', kind: 'taken', id, episodeId }]
	};
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
