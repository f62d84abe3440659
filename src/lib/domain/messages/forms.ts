/** The bodies and fields of the message calls. A refusal names field, value and limit. */
import { z } from 'zod';
import { reason, text, tooLong } from '../core/fields';
import { DEFAULT_COUNTRY, PhoneError, normalisePhone } from './phone';

export const SMS_TEXT_MAX = 10_000;

/** Body of `POST /api/calculate/sms`. The text is counted as it is: nothing is trimmed. */
export const calculateSmsBody = z.strictObject({
	text: z.string({ error: 'text is missing or no text.' }).max(SMS_TEXT_MAX, tooLong('text', SMS_TEXT_MAX))
});

/** A telephone number as people write it; the parsed value is its E.164 form. */
export function phoneField(field = 'phone', country: string = DEFAULT_COUNTRY) {
	return z
		.string({ error: `${field} is missing or no text.` })
		.max(40, tooLong(field, 40))
		.transform((value, context) => {
			try {
				return normalisePhone(value, country);
			} catch (error) {
				if (!(error instanceof PhoneError)) {
					throw error;
				}
				context.issues.push({ code: 'custom', message: `${field}: ${error.message}`, input: value });
				return z.NEVER;
			}
		});
}

export const SETTLE_NOTE_MAX = 500;

/** Fields of closing a text that came in: what was done about it, such as who was called and what was said. */
export const settleTextBody = z.strictObject({ note: text('note', SETTLE_NOTE_MAX) });
export const settleTextForm = z.strictObject({ note: text('What was done about it', SETTLE_NOTE_MAX) });

/** Fields of having a message sent again: why. */
export const resendBody = z.strictObject({ reason: reason('reason') });
export const resendForm = z.strictObject({ reason: reason('Why it is sent again') });
