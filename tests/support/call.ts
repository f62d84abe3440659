import type { RequestEvent } from '@sveltejs/kit';
import type { Person } from '$lib/domain/access/actor';
import { HOSPITAL_NOW } from './hospital';

type Handler = (event: RequestEvent) => Response | Promise<Response>;

export interface Answer {
	status: number;
	headers: Headers;
	body: Record<string, unknown>;
}

/**
 * Call the handler of an API route directly, as this person (or nobody) at this instant.
 * @param handler the exported `GET` or `POST` of a `+server.ts`
 */
export async function callRoute(
	handler: unknown,
	person: Person | null,
	given: {
		path?: string;
		params?: Record<string, string>;
		body?: unknown;
		key?: string;
		now?: number;
	} = {}
): Promise<Answer> {
	const url = new URL(given.path ?? '/api/test', 'http://127.0.0.1:4302');
	const writes = given.body !== undefined;
	const request = new Request(url, {
		method: writes ? 'POST' : 'GET',
		headers: {
			...(writes ? { 'Content-Type': 'application/json' } : {}),
			...(given.key === undefined ? {} : { 'Idempotency-Key': given.key })
		},
		body: writes ? JSON.stringify(given.body) : undefined
	});
	const context = { actor: person, now: given.now ?? HOSPITAL_NOW, address: '127.0.0.1', key: null };
	const event = { request, url, params: given.params ?? {}, locals: { context } };
	const response = await (handler as Handler)(event as unknown as RequestEvent);
	const text = await response.text();
	return {
		status: response.status,
		headers: response.headers,
		body: (text === '' ? {} : JSON.parse(text)) as Record<string, unknown>
	};
}
