import twilio from 'twilio';
import type { Env } from '../../env';
import { askedForDigit } from '../../messages/markup';
import type { Channel, Told } from './channel';
import { GATEWAY_LIMIT_MS, GatewayClient, GatewayRefusal } from './gateway-client';
import { judged } from './gateway-sent';

/** So long a telephone rings, in seconds: longer would only reach an answering machine. */
const RING_SECONDS = 30;
const TOLD_OF = ['initiated', 'ringing', 'answered', 'completed'];

/** Where the gateway posts the digit that was pressed in a call. */
export function digitAddress(digitUrl: string, messageId: string): string {
	return `${digitUrl}?message=${messageId}`;
}

/**
 * Telephone calls through the gateway's SDK. Whether a call of unknown outcome was made cannot be asked: two calls with
 * the same words cannot be told apart, and taking an older one for this one would be silence. A second ring is not.
 * @param limitMs how long one attempt may take
 * @throws Error when the account identifier is none
 */
export function voiceChannel(
	gateway: NonNullable<Env['sms']>,
	{ digitUrl, statusUrl }: { digitUrl: string; statusUrl: string },
	limitMs = GATEWAY_LIMIT_MS
): Channel {
	const httpClient = new GatewayClient(gateway.baseUrl, limitMs);
	const { calls } = twilio(gateway.accountSid, gateway.authToken, { httpClient, autoRetry: false });
	return {
		send: ({ id, to, body }) =>
			judged(() =>
				calls.create({
					to,
					from: gateway.from,
					twiml: askedForDigit(body, digitAddress(digitUrl, id)),
					timeout: RING_SECONDS,
					statusCallback: statusUrl,
					statusCallbackEvent: TOLD_OF
				})
			),
		lookUp: null,
		end: (providerId) => ended(() => calls(providerId).update({ status: 'completed' })),
		statusOf: async (providerId): Promise<Told | null> => {
			try {
				const { status } = await calls(providerId).fetch();
				return typeof status === 'string' ? { status, errorCode: null } : null;
			} catch {
				return null;
			}
		}
	};
}

/** A call that the gateway will not end is over already; one that it cannot end now is tried again. */
async function ended(update: () => Promise<unknown>): Promise<boolean> {
	try {
		await update();
		return true;
	} catch (error) {
		return error instanceof GatewayRefusal && error.status < 500 && error.status !== 429;
	}
}
