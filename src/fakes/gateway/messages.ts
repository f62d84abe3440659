import { readForm, sendJson, type Exchange, type Route } from '../common/http';
import { startDelivery } from './delivery';
import { segmentsOf } from './segments';
import { API_VERSION, GatewayError, reading, rfc2822, sending, type Accepted } from './rest';
import { addMessage, isNumber, type Gateway, type Message, type SmsMode } from './state';

const BODY_LIMIT_CHARS = 1600;
const PAGE_SIZE = 50;
const PAGE_SIZE_LIMIT = 1000;
const ACCOUNT = `/${API_VERSION}/Accounts/([^/]+)`;

/** The Messages resource: send, look up one, list; and the account itself, which tells whether one is known here. */
export function messageRoutes(gateway: Gateway): Route[] {
	const list = new RegExp(`^${ACCOUNT}/Messages\\.json$`);
	const one = new RegExp(`^${ACCOUNT}/Messages/([^/]+)\\.json$`);
	const account = new RegExp(`^${ACCOUNT}\\.json$`);
	return [
		['GET', account, reading(gateway, (exchange) => fetchAccount(gateway, exchange))],
		['POST', list, sending(gateway, (exchange, mode) => acceptMessage(gateway, exchange, mode))],
		['GET', list, reading(gateway, (exchange) => listMessages(gateway, exchange))],
		['GET', one, reading(gateway, (exchange) => fetchMessage(gateway, exchange))]
	];
}

function fetchAccount({ settings }: Gateway, { response, url }: Exchange): void {
	const { accountSid } = settings;
	sendJson(response, 200, {
		sid: accountSid,
		friendly_name: 'Ropewalk',
		status: 'active',
		uri: url.pathname
	});
}

async function acceptMessage(gateway: Gateway, exchange: Exchange, mode: SmsMode): Promise<Accepted> {
	const form = await readForm(exchange.request);
	const number = form.get('To') ?? '';
	const body = form.get('Body') ?? '';
	checkMessage(gateway, form, number, body);
	const statusCallback = form.get('StatusCallback');
	const message = addMessage(gateway, { number, body, direction: 'out', status: 'queued', statusCallback });
	return { body: resourceOf(gateway, message), goOn: () => startDelivery(gateway, message, mode) };
}

/** The refusals an application has to live with, under the gateway's own numbers. */
function checkMessage(gateway: Gateway, form: URLSearchParams, number: string, body: string): void {
	const from = form.get('From');
	if (number === '') {
		throw new GatewayError(400, 21604, "A 'To' phone number is required.");
	}
	if (!isNumber(number)) {
		throw new GatewayError(400, 21211, `Invalid 'To' Phone Number: ${number}`);
	}
	if (from === null) {
		throw new GatewayError(400, 21603, "A 'From' phone number is required.");
	}
	if (from !== gateway.settings.from) {
		throw new GatewayError(400, 21606, `The 'From' phone number ${from} is not a number of this account.`);
	}
	if (body === '') {
		throw new GatewayError(400, 21602, 'Message body is required.');
	}
	if (body.length > BODY_LIMIT_CHARS) {
		throw new GatewayError(400, 21617, `The message body exceeds ${BODY_LIMIT_CHARS} characters.`);
	}
	if (gateway.optedOut.has(number)) {
		throw new GatewayError(400, 21610, 'Attempt to send to unsubscribed recipient');
	}
}

function fetchMessage(gateway: Gateway, { response, parts, url }: Exchange): void {
	const message = gateway.messages.get(parts[1] ?? '');
	if (!message) {
		throw new GatewayError(404, 20404, `The requested resource ${url.pathname} was not found`);
	}
	sendJson(response, 200, resourceOf(gateway, message));
}

/** Newest first, by page, filtered by `To`, `From`, and the day or the bounds of `DateSent`. */
function listMessages(gateway: Gateway, { response, url }: Exchange): void {
	const query = url.searchParams;
	const found = [...gateway.messages.values()]
		.filter((message) => matches(gateway, message, query))
		.reverse();
	const page_size = Math.max(1, clamp(query.get('PageSize'), PAGE_SIZE, PAGE_SIZE_LIMIT));
	const page = clamp(query.get('Page'), 0, Number.MAX_SAFE_INTEGER);
	const start = page * page_size;
	const messages = found.slice(start, start + page_size).map((message) => resourceOf(gateway, message));
	const next = new URLSearchParams(query);
	next.set('Page', String(page + 1));
	const next_page_uri = start + page_size < found.length ? `${url.pathname}?${next}` : null;
	sendJson(response, 200, {
		messages,
		page,
		page_size,
		start,
		next_page_uri,
		uri: url.pathname + url.search
	});
}

function matches(gateway: Gateway, message: Message, query: URLSearchParams): boolean {
	const { to, from } = endsOf(gateway, message);
	const at = message.sentAt ?? message.at;
	const day = query.get('DateSent');
	const before = query.get('DateSent<');
	const after = query.get('DateSent>');
	return (
		(!query.has('To') || query.get('To') === to) &&
		(!query.has('From') || query.get('From') === from) &&
		(day === null || new Date(at).toISOString().startsWith(day.slice(0, 10))) &&
		(before === null || at <= Date.parse(before)) &&
		(after === null || at >= Date.parse(after))
	);
}

function clamp(text: string | null, fallback: number, most: number): number {
	const value = Number(text);
	return text && Number.isInteger(value) && value >= 0 ? Math.min(value, most) : fallback;
}

function endsOf({ settings }: Gateway, { direction, number }: Message): { to: string; from: string } {
	return direction === 'out' ? { to: number, from: settings.from } : { to: settings.from, from: number };
}

/** One message in the shape that the SDK reads. */
function resourceOf(gateway: Gateway, message: Message): Record<string, unknown> {
	const { accountSid } = gateway.settings;
	const uri = `/${API_VERSION}/Accounts/${accountSid}/Messages/${message.sid}`;
	return {
		sid: message.sid,
		account_sid: accountSid,
		messaging_service_sid: null,
		...endsOf(gateway, message),
		body: message.body,
		status: message.status,
		direction: message.direction === 'out' ? 'outbound-api' : 'inbound',
		num_segments: String(segmentsOf(message.body)),
		num_media: '0',
		price: null,
		price_unit: 'USD',
		error_code: message.errorCode,
		error_message: message.errorCode === null ? null : 'Unreachable destination handset',
		date_created: rfc2822(message.at),
		date_updated: rfc2822(message.updatedAt),
		date_sent: message.sentAt === null ? null : rfc2822(message.sentAt),
		api_version: API_VERSION,
		uri: `${uri}.json`,
		subresource_uris: { media: `${uri}/Media.json` }
	};
}
