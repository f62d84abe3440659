import { createHash } from 'node:crypto';
import { readPatientReply } from '$lib/domain/messages/reply';
import type { SmsFields, SmsTemplate } from '$lib/domain/messages/templates';
import { readStaffReply } from '$lib/domain/messages/staff-reply';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { takeByText, takeOnlyCall } from './take-by-text';
import { meantCall } from './texted-calls';
import { answerTo, type AnswerTo, type ReceivedText, type Understood } from './understood';

/** The same words from the same number are answered once in so long: a telephone may answer by itself. */
const SAME_WORDS_EVERY_MS = 10 * 60 * 1000;
/** A number that is nobody's is told so once in so long. */
const UNKNOWN_EVERY_MS = 12 * 60 * 60 * 1000;

/**
 * What a text of staff does: TAKE takes an escalation. Everything else is answered with what can be done, because
 * somebody who wrote "ok, coming" believes that they have it. Nobody else reads these texts, and the answer says so.
 */
export async function onStaffText(tx: Tx, context: PersonContext, text: ReceivedText): Promise<Understood> {
	const { id } = context.actor;
	if (readPatientReply(text.body) === 'stop') {
		// From now on the gateway refuses every call for help to this number: somebody has to speak with them.
		return { understoodAs: 'staff-stop', handled: false };
	}
	const reply = readStaffReply(text.body);
	if (reply.kind === 'take') {
		return reply.code === null ? takeOnlyCall(tx, context, text) : takeByText(tx, context, reply.code, text);
	}
	const call = await meantCall(tx, id, text.now);
	const code = typeof call === 'string' ? null : call.code;
	const understoodAs = reply.kind === 'unclear' ? 'take' : 'staff';
	return toldOnce(text, understoodAs, { userId: id }, 'staff-unclear', { code });
}

/** A number of several colleagues: whose reply it was cannot be told, so nothing is taken. */
export function onSharedStaffText(from: string, text: ReceivedText): Understood {
	return toldOnce(text, 'shared-staff', { address: from }, 'shared-number', {});
}

/**
 * TAKE from a number that nobody of staff has: somebody believes that they took a call. They are told that they
 * did not, and a coordinator looks into whose number it is.
 */
export function onUnknownTake(from: string, text: ReceivedText): Understood {
	const causeKey = `unknown-take:${from}:${Math.floor(text.now / UNKNOWN_EVERY_MS)}`;
	const answer = answerTo(text, { address: from }, 'unknown-number', {}, { causeKey });
	return { understoodAs: 'unknown-number', handled: false, change: { messages: [answer] } };
}

function toldOnce<T extends SmsTemplate>(
	text: ReceivedText,
	understoodAs: string,
	to: AnswerTo,
	template: T,
	fields: SmsFields<T>
): Understood {
	const said = createHash('sha256')
		.update(`${Object.values(to).join()} ${text.body}`)
		.digest('hex');
	const causeKey = `staff-said:${said}:${Math.floor(text.now / SAME_WORDS_EVERY_MS)}`;
	return {
		understoodAs,
		handled: true,
		change: { messages: [answerTo(text, to, template, fields, { causeKey })] }
	};
}
