import type { AuditEvent } from '$lib/domain/audit/actions';
import type { SmsFields, SmsTemplate } from '$lib/domain/messages/templates';
import { smsText } from '$lib/domain/messages/templates';
import { env } from '../env';
import type { NewMessage } from '../outbox/enqueue';
import type { Change } from '../write';

/** A text that came in, once it is known whose it is. */
export interface ReceivedText {
	/** Our identifier, under which it is stored. */
	id: string;
	/** The gateway's. */
	providerId: string;
	body: string;
	now: number;
}

/** What a text was understood as, and what follows from it in the same transaction. */
export interface Understood {
	understoodAs: string;
	/** False when a person still has to look at it. */
	handled: boolean;
	/** The visit that it was an answer to. */
	visitId?: string;
	change?: Pick<Change<unknown>, 'entries' | 'events' | 'messages'> & { audit?: AuditEvent | AuditEvent[] };
}

/** An answer later than this would only confuse. */
const ANSWER_LIFE_MS = 60 * 60 * 1000;

/** A text back to whoever wrote. `to` names one of user, patient and a number that is nobody's alone. */
export function answerTo<T extends SmsTemplate>(
	text: ReceivedText,
	to: AnswerTo,
	template: T,
	fields: SmsFields<T>,
	options: { language?: string; causeKey?: string } = {}
): NewMessage {
	return { ...answerBase(text, to, options.causeKey), body: smsText(template, fields, options.language) };
}

/** Names the one text that may follow a STOP: it says that it was heard. `at` is the instant of the STOP. */
export function stopHeardKey(patientId: string, at: number): string {
	return `stop-heard:${patientId}:${at}`;
}

export type AnswerTo = { userId: string } | { patientId: string } | { address: string };

/** An answer but for its words. */
export function answerBase(
	text: ReceivedText,
	to: AnswerTo,
	causeKey = `answer:${text.providerId}`
): Omit<NewMessage, 'body'> {
	return {
		kind: 'answer',
		channel: 'sms',
		causeKey,
		...to,
		ref: { kind: 'inbound', id: text.id },
		expiresAt: text.now + ANSWER_LIFE_MS
	};
}

/** Who writes, and whom to call: what every text to a patient says. */
export function senderFields(): { sender: string; phone: string; emergency: string } {
	const { name, phone, emergency } = env().hospital;
	return { sender: name, phone, emergency };
}
