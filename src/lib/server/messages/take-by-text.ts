import { and, desc, eq, gt } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { smsText } from '$lib/domain/messages/templates';
import { routes } from '$lib/routes';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { escalationLinks, escalations } from '../db/schema';
import { env } from '../env';
import type { EscalationRow } from '../escalations/tell';
import { aroundLink } from '../links';
import type { NewMessage } from '../outbox/enqueue';
import type { Change } from '../write';
import { meantCall } from './texted-calls';
import { placeFields, tryTake } from './try-take';
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
	const to = { userId: actor.id };
	const tried = await tryTake(tx, context, id, 'text');
	switch (tried.kind) {
		case 'not-allowed':
			return answered(answerTo(text, to, 'may-not-take', {}));
		case 'unseen':
			return answered(unseen);
		case 'yours':
			return answered(await yours(tx, actor, tried.escalation, text), tried.change ?? undefined);
		case 'held':
		case 'over': {
			const fields = { ...(await placeFields(tx, tried.escalation)), since: tried.since };
			return answered(
				tried.kind === 'over'
					? answerTo(text, to, 'over-before', fields)
					: answerTo(text, to, 'taken-before', { ...fields, holder: tried.holder })
			);
		}
	}
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
