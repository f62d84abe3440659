import { calculateSmsBody } from '$lib/domain/messages/forms';
import { measureSms } from '$lib/domain/messages/sms-length';
import { computing } from '$lib/server/http/endpoint';

/** How long a text message is and in how many parts it travels. */
export const POST = computing(calculateSmsBody, ({ text }) => measureSms(text));
