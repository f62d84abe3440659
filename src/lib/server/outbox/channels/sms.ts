import twilio from 'twilio';
import type { Env } from '../../env';
import type { Channel, Outgoing, Told } from './channel';
import { GATEWAY_LIMIT_MS, GatewayClient, GatewayRefusal } from './gateway-client';
import { judged } from './gateway-sent';

/** How many of the newest messages to one number are looked through for one of unknown outcome. */
const LOOK_UP_LIMIT = 50;

/**
 * Text messages through the gateway's SDK.
 * @param statusUrl where the gateway posts what becomes of a message
 * @param limitMs how long one attempt may take
 * @throws Error when the account identifier is none
 */
export function smsChannel(
	gateway: NonNullable<Env['sms']>,
	statusUrl: string,
	limitMs = GATEWAY_LIMIT_MS
): Channel {
	const httpClient = new GatewayClient(gateway.baseUrl, limitMs);
	const client = twilio(gateway.accountSid, gateway.authToken, { httpClient, autoRetry: false });
	const { messages } = client;
	return {
		send: ({ to, body }) =>
			judged(() => messages.create({ to, from: gateway.from, body, statusCallback: statusUrl })),
		lookUp: (message) => lookUp(messages, message),
		statusOf: (providerId) => statusOf(messages, providerId),
		probe: () => isThere(() => client.api.v2010.accounts(gateway.accountSid).fetch())
	};
}

type Messages = ReturnType<typeof twilio>['messages'];

/** The clocks of gateway and hospital may differ, so nothing is filtered by time: receiver and text decide. */
async function lookUp(messages: Messages, { to, body }: Outgoing): Promise<string[] | null> {
	try {
		const found = await messages.list({ to, limit: LOOK_UP_LIMIT, pageSize: LOOK_UP_LIMIT });
		return found.filter((message) => message.body === body).map(({ sid }) => sid);
	} catch {
		return null;
	}
}

async function statusOf(messages: Messages, providerId: string): Promise<Told | null> {
	try {
		const { status, errorCode } = await messages(providerId).fetch();
		return typeof status === 'string' ? { status, errorCode: errorCode ? String(errorCode) : null } : null;
	} catch {
		return null;
	}
}

/** One that is busy is there. */
async function isThere(ask: () => Promise<unknown>): Promise<boolean> {
	try {
		await ask();
		return true;
	} catch (error) {
		return error instanceof GatewayRefusal && error.status === 429;
	}
}
