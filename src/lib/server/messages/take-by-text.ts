import { and, desc, eq, gt } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { Problem } from '$lib/domain/core/errors';
import { isOpenTo } from '$lib/domain/escalations/holding';
import type { PlaceFields } from '$lib/domain/messages/templates/escalation';
import { smsText } from '$lib/domain/messages/templates';
import { routes } from '$lib/routes';
import { accessEscalation } from '../access/access';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { escalationLinks, escalations, units, users } from '../db/schema';
import { env } from '../env';
import { confirm } from '../escalations/pass';
import { take } from '../escalations/take';
import { placeOf, type EscalationRow } from '../escalations/tell';
import { aroundLink } from '../links';
import type { NewMessage } from '../outbox/enqueue';
import type { Change } from '../write';
import { meantCall } from './texted-calls';
import { answerBase, answerTo, type ReceivedText, type Understood } from './understood';

/**
 * TAKE by text. The sender's number says who it is, and that person's role and units decide as they do on the page;
 * the code says only which call is meant. Whatever becomes of it is answered, because silence reads as a yes.
 */
export async function takeByText(
	tx: Tx,
	context: PersonContext,
	code: string,
	text: ReceivedText
): Promise<Understood> {
	const [row] = await tx
		.select({ id: escalations.id })
		.from(escalations)
		.where(eq(escalations.replyCode, code))
		.orderBy(desc(escalations.raisedAt), desc(escalations.id))
		.limit(1);
	const unknown = answerTo(text, { userId: context.actor.id }, 'unknown-code', { code });
	return row ? takeCall(tx, context, row.id, text, unknown) : answered(unknown);
}

/** TAKE alone: the one call that was sent to this person, while it waits; with none or several it is asked back. */
export async function takeOnlyCall(tx: Tx, context: PersonContext, text: ReceivedText): Promise<Understood> {
	const to = { userId: context.actor.id };
	const call = await meantCall(tx, to.userId, text.now);
	if (call === 'several') {
		return answered(answerTo(text, to, 'which-one', {}));
	}
	const none = answerTo(text, to, 'none-open', {});
	return call === 'none' ? answered(none) : takeCall(tx, context, call.id, text, none);
}

/** @param unseen the answer when this person may not see the call: the same as when there is none */
async function takeCall(
	tx: Tx,
	context: PersonContext,
	id: string,
	text: ReceivedText,
	unseen: NewMessage
): Promise<Understood> {
	const { actor } = context;
	let escalation: EscalationRow;
	try {
		({ escalation } = await accessEscalation(tx, actor, id, 'escalation.take'));
	} catch (error) {
		if (!(error instanceof Problem)) {
			throw error;
		}
		const refused = error.code === 'not-allowed';
		return answered(refused ? answerTo(text, { userId: actor.id }, 'may-not-take', {}) : unseen);
	}
	if (isOpenTo(escalation, actor.id)) {
		const change = await take(tx, context, actor, escalation, null, 'text');
		return answered(await yours(tx, actor, escalation, text), change);
	}
	if (escalation.state === 'taken' && escalation.passTo === actor.id) {
		const change = await confirm(tx, context, actor, escalation);
		return answered(await yours(tx, actor, escalation, text), change);
	}
	return answered(await tooLate(tx, actor, escalation, text));
}

function answered(message: NewMessage, change?: Change<unknown>): Understood {
	const messages = [...(change?.messages ?? []), message];
	return { understoodAs: 'take', handled: true, change: { ...change, messages } };
}

/** With the link that this person was sent, where it still opens; else with the address behind the sign-in. */
async function yours(tx: Tx, person: Person, escalation: EscalationRow, text: ReceivedText) {
	const place = await placeFields(tx, escalation);
	const [link] = await tx
		.select({ id: escalationLinks.id })
		.from(escalationLinks)
		.where(
			and(
				eq(escalationLinks.escalationId, escalation.id),
				eq(escalationLinks.userId, person.id),
				gt(escalationLinks.expiresAt, text.now)
			)
		)
		.orderBy(desc(escalationLinks.createdAt), desc(escalationLinks.id))
		.limit(1);
	const base = answerBase(text, { userId: person.id });
	return link
		? { ...base, linkId: link.id, body: aroundLink((url) => smsText('took-it', { ...place, link: url })) }
		: {
				...base,
				body: smsText('took-it', { ...place, link: env().publicUrl + routes.escalation(escalation.id) })
			};
}

/** Somebody has it, perhaps this person by an earlier press; or it has ended. */
async function tooLate(tx: Tx, person: Person, escalation: EscalationRow, text: ReceivedText) {
	if (escalation.state === 'taken' && escalation.takenBy === person.id) {
		return yours(tx, person, escalation, text);
	}
	const place = await placeFields(tx, escalation);
	const to = { userId: person.id };
	if (escalation.state !== 'taken') {
		const since = escalation.endedAt ?? escalation.raisedAt;
		return answerTo(text, to, 'over-before', { ...place, since });
	}
	const [holder] = await tx
		.select({ role: users.role })
		.from(users)
		.where(eq(users.id, escalation.takenBy ?? ''));
	const since = escalation.takenAt ?? escalation.raisedAt;
	return answerTo(text, to, 'taken-before', { ...place, since, holder: holder?.role ?? 'nurse' });
}

async function placeFields(tx: Tx, escalation: EscalationRow): Promise<PlaceFields & { zone: string }> {
	const { unitId, unit, bed } = await placeOf(tx, escalation.episodeId);
	const [row] = await tx.select({ zone: units.zone }).from(units).where(eq(units.id, unitId));
	return { unit, bed, grade: escalation.grade, zone: row?.zone ?? 'UTC' };
}
