import { calculateSmsBody } from '$lib/domain/messages/forms';
import { measureSms } from '$lib/domain/messages/sms-length';
import { writing } from '$lib/server/http/endpoint';

/** How long a text message is and in how many parts it travels. Nothing is stored. */
export const POST = writing({
	permission: 'own-account.change',
	body: calculateSmsBody,
	run: (_context, { text }) => Promise.resolve({ result: measureSms(text), replayed: false })
});
