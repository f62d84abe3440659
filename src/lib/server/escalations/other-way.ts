/** The further ways to one person whose text about a call for help did not get through: their telephone, a mail. */
import { and, eq, inArray, like } from 'drizzle-orm';
import type { MessageChannel } from '$lib/domain/messages/codes';
import { mailText, STAFF_CALLS } from '$lib/domain/messages/templates';
import type { Tx } from '../db';
import { escalationSteps, outbox } from '../db/schema';
import { newId } from '../ids';
import type { OutboxRow } from '../outbox/change';
import { enqueue, type NewMessage } from '../outbox/enqueue';
import { noticeKey, textKeyOf } from '../push/copies';
import { placeOf, type EscalationRow } from './tell';

/** Nobody knows whether it went, and it is tried again. */
const UNKNOWN = ['no-answer', 'answer-without-id'];

/** Ring the telephone of whom a text was for; once for each text. */
export async function telephone(
	tx: Tx,
	escalation: EscalationRow,
	text: OutboxRow,
	now: number
): Promise<void> {
	const { unit, bed } = await placeOf(tx, escalation.episodeId);
	const body = STAFF_CALLS.call.en({ unit, bed, grade: escalation.grade });
	await follow(tx, text, { channel: 'voice', causeKey: `call:${text.id}`, body }, now);
}

/**
 * A mail to whom a text was for; once for each text, and only where no notice on a device may reach them either.
 * @param row the text, or a notice that went beside it
 */
export async function mailInstead(
	tx: Tx,
	escalation: EscalationRow,
	row: OutboxRow,
	now: number
): Promise<void> {
	const text = row.channel === 'push' ? await textBeside(tx, row) : row;
	if (text?.channel !== 'sms' || (await mayBeShown(tx, text))) {
		return;
	}
	const { unit, bed } = await placeOf(tx, escalation.episodeId);
	const fields = { unit, bed, grade: escalation.grade, link: '{link}' };
	const { subject, text: body } = mailText('call', fields);
	const { linkId } = text;
	const mail = {
		channel: 'mail',
		causeKey: `mail:${text.id}`,
		subject,
		body,
		linkId: linkId ?? undefined
	} as const;
	await follow(tx, text, mail, now);
}

/** The text that a notice went beside, where it is in trouble itself. */
async function textBeside(tx: Tx, { causeKey }: OutboxRow): Promise<OutboxRow | null> {
	const [text] = await tx
		.select()
		.from(outbox)
		.where(eq(outbox.causeKey, textKeyOf(causeKey)));
	const failed = text?.state === 'failed' || text?.state === 'undelivered';
	const unknown = text?.state === 'ready' && UNKNOWN.includes(text.stateReason ?? '');
	return text && (failed || unknown) ? text : null;
}

async function mayBeShown(tx: Tx, { causeKey }: OutboxRow): Promise<boolean> {
	const beside = like(outbox.causeKey, noticeKey(causeKey, '%'));
	const may = inArray(outbox.state, ['ready', 'sending', 'accepted', 'delivered']);
	return (await tx.$count(outbox, and(beside, may))) > 0;
}

type Following = Pick<NewMessage, 'causeKey' | 'subject' | 'body' | 'linkId'> & { channel: MessageChannel };

/** Write the message that follows a text, unless it was written before, and put it beside the text in the history. */
async function follow(tx: Tx, text: OutboxRow, following: Following, now: number): Promise<void> {
	if ((await tx.$count(outbox, eq(outbox.causeKey, following.causeKey))) > 0) {
		return;
	}
	const id = newId();
	const { userId, refId, expiresAt } = text;
	const to = { userId: userId ?? undefined, ref: { kind: 'escalation' as const, id: refId }, expiresAt };
	await enqueue(tx, now, [{ id, kind: 'escalation', ...to, ...following }]);
	const [told] = await tx.select().from(escalationSteps).where(eq(escalationSteps.messageId, text.id));
	if (told) {
		const { channel } = following;
		await tx.insert(escalationSteps).values({ ...told, id: newId(), at: now, channel, messageId: id });
	}
}
