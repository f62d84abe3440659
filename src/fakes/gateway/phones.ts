import { readJson, Refusal, sendJson, sendTagged, type Exchange, type Route } from '../common/http';
import { pressDigits } from './ringing';
import { API_VERSION } from './rest';
import { addMessage, isNumber, phoneOf, type Call, type Gateway, type Message } from './state';
import { readInstructions } from './twiml';
import { postWebhook } from './webhook';

const REPLY_LIMIT_CHARS = 1600;
/** The words this account has set up for leaving and coming back. */
const OPT_OUT = new Set(['STOP', 'STOPALL', 'UNSUBSCRIBE']);
const OPT_IN = new Set(['START', 'UNSTOP']);

/** The side for people and tests: look at the phones, name their owners, reply, press a digit. */
export function phoneRoutes(gateway: Gateway): Route[] {
	const reply = (exchange: Exchange) => replyFrom(gateway, exchange);
	const digits = (exchange: Exchange) => press(gateway, exchange);
	return [
		[
			'GET',
			/^\/phones$/,
			(exchange) => sendTagged(exchange, tagOf(gateway), () => ({ items: view(gateway) }))
		],
		['PUT', /^\/phones$/, (exchange) => nameOwners(gateway, exchange)],
		['POST', /^\/phones\/([^/]+)\/reply$/, reply],
		['POST', /^\/calls\/([^/]+)\/digits$/, digits],
		['PUT', /^\/calls\/([^/]+)\/digits$/, digits]
	];
}

function tagOf({ boot, version }: Gateway): string {
	return `"${boot}-${version}"`;
}

function view(gateway: Gateway): unknown[] {
	return [...gateway.phones.values()].map(({ number, owner, messages, calls }) => ({
		number,
		owner,
		messages: messages.map(viewMessage),
		calls: calls.map(viewCall)
	}));
}

function viewMessage({ sid, at, direction, body, status }: Message): unknown {
	return { sid, at: new Date(at).toISOString(), direction, body, status };
}

function viewCall({ sid, at, status, said, pressed, digitsTo }: Call): unknown {
	return { sid, at: new Date(at).toISOString(), status, said, pressed, waitsForDigit: digitsTo !== null };
}

/** `PUT /phones {items: [{number, owner}]}` adds phones or renames their owners; nobody is removed. */
async function nameOwners(gateway: Gateway, { request, response }: Exchange): Promise<void> {
	const { items } = await readJson(request);
	if (!Array.isArray(items)) {
		throw new Refusal(422, 'items must be a list of {number, owner}.');
	}
	const named = items.map((item: unknown, index) => readOwner(item, index));
	for (const { number, owner } of named) {
		phoneOf(gateway, number).owner = owner;
	}
	gateway.version += 1;
	sendJson(response, 200, { items: view(gateway) });
}

function readOwner(item: unknown, index: number): { number: string; owner: string } {
	const { number, owner } = (item ?? {}) as { number?: unknown; owner?: unknown };
	if (typeof number !== 'string' || !isNumber(number)) {
		throw new Refusal(422, `items[${index}].number is '${String(number)}': it must be like +353860000001.`);
	}
	if (typeof owner !== 'string' || owner === '' || owner.length > 200) {
		throw new Refusal(422, `items[${index}].owner must be a text of 1 to 200 characters.`);
	}
	return { number, owner };
}

/**
 * `POST /phones/:number/reply {body}` writes from this phone to the application. Answers what the webhook did:
 * `{sid, status}` with the HTTP status of the webhook; 502 and a status of null when it could not be reached.
 */
async function replyFrom(gateway: Gateway, { request, response, parts }: Exchange): Promise<void> {
	const number = numberOf(parts[0] ?? '');
	const { body } = await readJson(request);
	if (typeof body !== 'string' || body.trim() === '' || body.length > REPLY_LIMIT_CHARS) {
		throw new Refusal(422, `body must be a text of 1 to ${REPLY_LIMIT_CHARS} characters.`);
	}
	const message = addMessage(gateway, {
		number,
		body,
		direction: 'in',
		status: 'received',
		statusCallback: null
	});
	noteOptOut(gateway, number, body);
	const { authToken, publicUrl } = gateway.settings;
	const answer = await postWebhook(authToken, `${publicUrl}/api/hooks/sms`, inboundFields(gateway, message));
	if (!answer) {
		sendJson(response, 502, { sid: message.sid, status: null, detail: `${publicUrl} could not be reached.` });
		return;
	}
	if (answer.status < 300) {
		answerPhone(gateway, number, answer.body);
	}
	sendJson(response, 200, { sid: message.sid, status: answer.status });
}

/** A number as it stands in an address, where a plus may have been read as a blank or left out. */
function numberOf(part: string): string {
	const number = `+${part.replace(/[\s+]/g, '')}`;
	if (!isNumber(number)) {
		throw new Refusal(422, `number is '${part}': it must be like +353860000001.`);
	}
	return number;
}

function noteOptOut(gateway: Gateway, number: string, body: string): void {
	const word = body.trim().toUpperCase();
	if (OPT_OUT.has(word)) {
		gateway.optedOut.add(number);
	}
	if (OPT_IN.has(word)) {
		gateway.optedOut.delete(number);
	}
}

function inboundFields({ settings }: Gateway, { sid, number, body }: Message): Record<string, string> {
	return {
		AccountSid: settings.accountSid,
		ApiVersion: API_VERSION,
		Body: body,
		From: number,
		To: settings.from,
		MessageSid: sid,
		NumMedia: '0',
		NumSegments: '1',
		SmsMessageSid: sid,
		SmsSid: sid,
		SmsStatus: 'received'
	};
}

/** A webhook may answer with texts of its own, which the gateway sends to the phone. */
function answerPhone(gateway: Gateway, number: string, markup: string): void {
	if (gateway.optedOut.has(number)) {
		return;
	}
	for (const body of readInstructions(markup).replies) {
		addMessage(gateway, { number, body, direction: 'out', status: 'delivered', statusCallback: null });
	}
}

/** `POST /calls/:sid/digits {digits}` presses keys. Answers `{sid, status}` as a reply does. */
async function press(gateway: Gateway, { request, response, parts }: Exchange): Promise<void> {
	const call = gateway.calls.get(parts[0] ?? '');
	const { digits } = await readJson(request);
	if (typeof digits !== 'string' || !/^[0-9*#]{1,20}$/.test(digits)) {
		throw new Refusal(422, `digits is '${String(digits)}': it must be 1 to 20 of 0-9, * and #.`);
	}
	if (!call) {
		throw new Refusal(404, 'There is no such call.');
	}
	if (call.digitsTo === null || call.status !== 'in-progress') {
		throw new Refusal(409, `The call is ${call.status} and waits for no digit.`);
	}
	const answer = await pressDigits(gateway, call, digits);
	sendJson(response, answer ? 200 : 502, { sid: call.sid, status: answer?.status ?? null });
}
