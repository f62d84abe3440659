import type { IncomingMessage } from 'node:http';
import { setTimeout as delay } from 'node:timers/promises';
import { takeFault } from '../common/faults';
import { sendJson, type Exchange, type Handler } from '../common/http';
import type { Gateway, SmsMode } from './state';

export const API_VERSION = '2010-04-01';

/** A request that the gateway refuses, with the number it is documented under. */
export class GatewayError extends Error {
	constructor(
		readonly status: number,
		readonly code: number,
		message: string
	) {
		super(message);
	}
}

/** An instant as the gateway writes it: RFC 2822, whole seconds, UTC. */
export function rfc2822(at: number): string {
	return new Date(at).toUTCString().replace('GMT', '+0000');
}

/** A read under the account: signed in, the account in the path is ours, and no outage. */
export function reading(gateway: Gateway, handle: Handler): Handler {
	return guarded(gateway, async (exchange) => {
		// An outage covers reading too; it is counted by what is sent alone.
		if (!(await passOutage(exchange, gateway.fault.mode))) {
			return;
		}
		await handle(exchange);
	});
}

/** What a sending handler accepted: the answer's body, and what happens afterwards. */
export interface Accepted {
	body: unknown;
	goOn: () => void;
}

/** A request that sends something, with the fault that is set carried out around it. */
export function sending(
	gateway: Gateway,
	accept: (exchange: Exchange, mode: SmsMode) => Promise<Accepted>
): Handler {
	return guarded(gateway, async (exchange) => {
		const mode = takeFault<SmsMode>(gateway.fault);
		if (!(await passOutage(exchange, mode))) {
			return;
		}
		const { body, goOn } = await accept(exchange, mode);
		goOn();
		if (mode === 'accept-then-drop') {
			exchange.request.socket.destroy();
			return;
		}
		if (mode === 'slow') {
			await delay(gateway.settings.slowMs, undefined, { ref: false });
		}
		sendJson(exchange.response, 201, body);
	});
}

/** Carries out the faults in which nothing is accepted. Answers whether the request may go on. */
async function passOutage({ request, response }: Exchange, mode: SmsMode): Promise<boolean> {
	switch (mode) {
		case 'refuse':
			request.socket.destroy();
			return false;
		case '500':
			sendError(response, new GatewayError(500, 20500, 'An internal server error has occurred'));
			return false;
		case '429':
			sendError(response, new GatewayError(429, 20429, 'Too Many Requests'), { 'Retry-After': '1' });
			return false;
		default:
			return true;
	}
}

function guarded(gateway: Gateway, handle: Handler): Handler {
	return async (exchange) => {
		try {
			checkAccount(gateway, exchange);
			await handle(exchange);
		} catch (error) {
			if (!(error instanceof GatewayError)) {
				throw error;
			}
			sendError(exchange.response, error);
		}
	};
}

function checkAccount({ settings }: Gateway, { request, parts, url }: Exchange): void {
	const [user, password] = basicAuth(request);
	if (user !== settings.accountSid || password !== settings.authToken) {
		throw new GatewayError(401, 20003, 'Authenticate');
	}
	if (parts[0] !== settings.accountSid) {
		throw new GatewayError(404, 20404, `The requested resource ${url.pathname} was not found`);
	}
}

function basicAuth(request: IncomingMessage): [user: string, password: string] {
	const encoded = /^Basic (.+)$/i.exec(request.headers.authorization ?? '')?.[1] ?? '';
	const text = Buffer.from(encoded, 'base64').toString('utf8');
	const colon = text.indexOf(':');
	return colon < 0 ? ['', ''] : [text.slice(0, colon), text.slice(colon + 1)];
}

function sendError(
	response: Exchange['response'],
	{ status, code, message }: GatewayError,
	headers: Record<string, string> = {}
): void {
	const more_info = `https://www.twilio.com/docs/errors/${code}`;
	sendJson(response, status, { code, message, more_info, status }, headers);
}
