import { Agent } from 'node:https';
import webPush from 'web-push';
import { pushOutcome } from '$lib/domain/messages/outcome';
import { readRetryAfter } from '$lib/domain/messages/retry';
import { isAllowedEndpoint } from '$lib/domain/push/devices';
import { now } from '../../clock';
import type { Env } from '../../env';
import type { Channel, Notice, Outgoing, Sent } from './channel';
import { GATEWAY_LIMIT_MS } from './gateway-client';

/** What every push service takes, RFC 8030 section 7.2, less what encryption adds; the library does not look. */
const PAYLOAD_MAX_BYTES = 3_900;

/**
 * Notices on devices through their push services. Whether one of unknown outcome went through cannot be asked; a second
 * one takes the place of the first on the device.
 * @param limitMs how long one attempt may take
 */
export function pushChannel(gateway: NonNullable<Env['push']>, limitMs = GATEWAY_LIMIT_MS): Channel {
	const trust = new Trust(gateway.standIn, limitMs);
	return {
		lookUp: null,
		send: async (message) => {
			const { notice } = message;
			if (!notice || !isAllowedEndpoint(message.to, gateway.hosts)) {
				return { outcome: { kind: 'permanent', reason: 'bad-address' }, code: 'not-allowed' };
			}
			const payload = payloadOf(message, notice);
			if (Buffer.byteLength(payload) > PAYLOAD_MAX_BYTES) {
				return { outcome: { kind: 'permanent', reason: 'refused' }, code: 'too-long' };
			}
			return judged(message.id, async () => {
				const to = { endpoint: message.to, keys: notice.keys };
				return webPush.sendNotification(to, payload, {
					vapidDetails: { subject: gateway.contact, ...keysOf(gateway) },
					agent: await trust.agent(),
					timeout: limitMs,
					TTL: notice.ttlSeconds,
					urgency: notice.urgent ? 'high' : 'normal',
					topic: notice.topic
				});
			});
		}
	};
}

function keysOf({ publicKey, privateKey }: NonNullable<Env['push']>) {
	return { publicKey, privateKey };
}

/** What the service worker reads: `src/lib/client/service-worker/notice.ts`. */
function payloadOf({ subject, body }: Outgoing, { link, topic }: Notice): string {
	return JSON.stringify({ title: subject ?? '', body, url: link, tag: topic });
}

async function judged(id: string, send: () => Promise<unknown>): Promise<Sent> {
	try {
		await send();
		const answered = { kind: 'answered', status: 201, id, code: null, retryAfter: null } as const;
		return { outcome: pushOutcome(answered), code: null };
	} catch (error) {
		return judgedError(error);
	}
}

/** A refusal has a status and headers; a connection that failed has a code. Nothing else of either is trusted. */
function judgedError(error: unknown): Sent {
	const { statusCode: status, headers, code } = (error ?? {}) as Record<string, unknown>;
	if (typeof status === 'number') {
		const asked = (headers as Record<string, unknown> | undefined)?.['retry-after'];
		const retryAfter = readRetryAfter(typeof asked === 'string' ? asked : null, now());
		const outcome = pushOutcome({ kind: 'answered', status, id: null, code: null, retryAfter });
		return { outcome, code: String(status) };
	}
	const known = typeof code === 'string' ? code : null;
	return { outcome: pushOutcome({ kind: 'failed', code: known }), code: known };
}

/**
 * Whom the connection trusts: everybody that the system does, and in a demonstration the certificate that the stand-in
 * has made for itself, which is asked for again when it was started anew.
 */
class Trust {
	#agent: Agent | null = null;
	#of = '';

	constructor(
		private readonly standIn: string | null,
		private readonly limitMs: number
	) {}

	async agent(): Promise<Agent | undefined> {
		if (this.standIn === null) {
			return undefined;
		}
		const signal = AbortSignal.timeout(this.limitMs);
		const certificate = await (await fetch(`${this.standIn}/push/certificate`, { signal })).text();
		if (this.#agent === null || certificate !== this.#of) {
			this.#of = certificate;
			this.#agent = new Agent({ ca: certificate });
		}
		return this.#agent;
	}
}
