import { createHmac, randomUUID } from 'node:crypto';
import { request as requestHttp } from 'node:http';
import { request as requestHttps } from 'node:https';
import { setTimeout as delay } from 'node:timers/promises';

/** What a webhook answered. */
export interface WebhookAnswer {
	status: number;
	body: string;
}

const TIME_LIMIT_MS = 15_000;
const RETRY_AFTER_MS = 500;
const ANSWER_LIMIT_CHARS = 64 * 1024;

/**
 * The signature that `validateRequest` of the gateway's SDK checks: HMAC-SHA1 in base64, keyed by the auth token,
 * over the whole address followed by each field's name and value in the order of the names.
 */
export function sign(authToken: string, url: string, fields: Record<string, string>): string {
	const signed = Object.keys(fields)
		.sort()
		.reduce((text, name) => text + name + (fields[name] ?? ''), url);
	return createHmac('sha1', authToken).update(signed, 'utf8').digest('base64');
}

/**
 * Posts form fields with their signature and without an `Origin`, as the gateway does. One more attempt follows
 * when the connection fails, none when an answer came, whatever it was.
 * @returns the answer, or null when the address could not be reached.
 */
export async function postWebhook(
	authToken: string,
	url: string,
	fields: Record<string, string>
): Promise<WebhookAnswer | null> {
	const headers = {
		'Content-Type': 'application/x-www-form-urlencoded; charset=UTF-8',
		'User-Agent': 'TwilioProxy/1.1',
		'X-Twilio-Signature': sign(authToken, url, fields),
		// The same in both attempts, so that the receiver can tell a retry.
		'I-Twilio-Idempotency-Token': randomUUID()
	};
	const body = new URLSearchParams(fields).toString();
	try {
		return await post(url, headers, body);
	} catch {
		await delay(RETRY_AFTER_MS);
		return post(url, headers, body).catch(() => null);
	}
}

function post(url: string, headers: Record<string, string>, body: string): Promise<WebhookAnswer> {
	const send = url.startsWith('https:') ? requestHttps : requestHttp;
	return new Promise((resolve, reject) => {
		const length = { 'Content-Length': Buffer.byteLength(body) };
		const signal = AbortSignal.timeout(TIME_LIMIT_MS);
		const request = send(url, { method: 'POST', headers: { ...headers, ...length }, signal }, (response) => {
			let text = '';
			response.setEncoding('utf8');
			response.on('data', (chunk: string) => (text = (text + chunk).slice(0, ANSWER_LIMIT_CHARS)));
			response.on('error', reject);
			response.on('end', () => resolve({ status: response.statusCode ?? 0, body: text }));
		});
		request.on('error', reject);
		request.end(body);
	});
}
