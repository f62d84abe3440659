import { readForm, sendJson, type Exchange, type Route } from '../common/http';
import { API_VERSION, GatewayError, reading, rfc2822, sending, type Accepted } from './rest';
import { hangUp, ring, type Script } from './ringing';
import { isNumber, newSid, phoneOf, type Call, type Gateway, type SmsMode } from './state';

const ACCOUNT = `/${API_VERSION}/Accounts/([^/]+)`;

/** The Calls resource: ring a phone, look up a call, hang it up, list. */
export function callRoutes(gateway: Gateway): Route[] {
	const list = new RegExp(`^${ACCOUNT}/Calls\\.json$`);
	const one = new RegExp(`^${ACCOUNT}/Calls/([^/]+)\\.json$`);
	return [
		['POST', list, sending(gateway, (exchange, mode) => acceptCall(gateway, exchange, mode))],
		['GET', list, reading(gateway, (exchange) => listCalls(gateway, exchange))],
		['GET', one, reading(gateway, ({ response, parts, url }) => fetchCall(gateway, response, parts, url))],
		['POST', one, reading(gateway, (exchange) => updateCall(gateway, exchange))]
	];
}

async function acceptCall(gateway: Gateway, exchange: Exchange, mode: SmsMode): Promise<Accepted> {
	const form = await readForm(exchange.request);
	const number = form.get('To') ?? '';
	const script = scriptOf(form);
	if (!isNumber(number)) {
		throw new GatewayError(400, 21211, `Invalid 'To' Phone Number: ${number}`);
	}
	if (form.get('From') !== gateway.settings.from) {
		throw new GatewayError(400, 21210, `'From' phone number not verified: ${form.get('From')}`);
	}
	const call = addCall(gateway, number, form);
	return { body: resourceOf(gateway, call), goOn: () => void ring(gateway, call, script, mode) };
}

function scriptOf(form: URLSearchParams): Script {
	const markup = form.get('Twiml');
	const url = form.get('Url');
	if (markup) {
		return { markup };
	}
	if (url && URL.canParse(url)) {
		return { url };
	}
	throw new GatewayError(400, 21205, `Url is not a valid URL: ${url ?? ''}`);
}

function addCall(gateway: Gateway, number: string, form: URLSearchParams): Call {
	const at = Date.now();
	const events = form.getAll('StatusCallbackEvent');
	const call: Call = {
		sid: newSid('CA'),
		at,
		updatedAt: at,
		startedAt: null,
		endedAt: null,
		number,
		status: 'queued',
		said: [],
		pressed: '',
		digitsTo: null,
		statusCallback: form.get('StatusCallback'),
		callbackEvents: events.length > 0 ? events : ['completed']
	};
	gateway.calls.set(call.sid, call);
	phoneOf(gateway, number).calls.push(call);
	gateway.version += 1;
	return call;
}

function fetchCall(gateway: Gateway, response: Exchange['response'], parts: string[], url: URL): void {
	sendJson(response, 200, resourceOf(gateway, callOf(gateway, parts, url)));
}

/** Hanging up is the one change that is understood: `Status` completed, or canceled before it was picked up. */
async function updateCall(gateway: Gateway, { request, response, parts, url }: Exchange): Promise<void> {
	const status = (await readForm(request)).get('Status');
	const call = callOf(gateway, parts, url);
	if (status !== 'completed' && status !== 'canceled') {
		throw new GatewayError(400, 21220, `Invalid call state: ${status ?? 'none given'}`);
	}
	hangUp(gateway, call, status);
	sendJson(response, 200, resourceOf(gateway, call));
}

function callOf(gateway: Gateway, parts: string[], url: URL): Call {
	const call = gateway.calls.get(parts[1] ?? '');
	if (!call) {
		throw new GatewayError(404, 20404, `The requested resource ${url.pathname} was not found`);
	}
	return call;
}

function listCalls(gateway: Gateway, { response, url }: Exchange): void {
	const to = url.searchParams.get('To');
	const found = [...gateway.calls.values()].filter(({ number }) => to === null || to === number).reverse();
	const calls = found.map((call) => resourceOf(gateway, call));
	sendJson(response, 200, {
		calls,
		page: 0,
		page_size: calls.length,
		next_page_uri: null,
		uri: url.pathname + url.search
	});
}

/** One call in the shape that the SDK reads. */
function resourceOf({ settings }: Gateway, call: Call): Record<string, unknown> {
	const uri = `/${API_VERSION}/Accounts/${settings.accountSid}/Calls/${call.sid}.json`;
	const { startedAt, endedAt } = call;
	const seconds = endedAt === null ? null : String(Math.round((endedAt - (startedAt ?? endedAt)) / 1000));
	return {
		sid: call.sid,
		account_sid: settings.accountSid,
		to: call.number,
		from: settings.from,
		status: call.status,
		direction: 'outbound-api',
		date_created: rfc2822(call.at),
		date_updated: rfc2822(call.updatedAt),
		start_time: startedAt === null ? null : rfc2822(startedAt),
		end_time: endedAt === null ? null : rfc2822(endedAt),
		duration: seconds,
		price: null,
		price_unit: 'USD',
		answered_by: null,
		api_version: API_VERSION,
		uri,
		subresource_uris: {}
	};
}
