import { v7 } from 'uuid';
import { m } from '$lib/i18n/paraglide/messages';

/** An answer of the JSON API that is not a success, with the members of its problem+json. */
export class ApiProblem extends Error {
	constructor(
		readonly status: number,
		/** The stable code, such as `already-taken`; `network` when no answer came, `offline` when it could not. */
		readonly code: string,
		readonly detail: string,
		readonly body: Record<string, unknown> = {}
	) {
		super(detail);
		this.name = 'ApiProblem';
	}

	/** Field errors by their pointer without the leading slash, such as `readings/0/hr`. */
	get fields(): Record<string, string> {
		const errors = (this.body.errors ?? []) as { pointer: string; message: string }[];
		return Object.fromEntries(errors.map(({ pointer, message }) => [pointer.slice(1), message]));
	}
}

/** Read from the JSON API. */
export async function getJson<T>(path: string, fetcher: typeof fetch = fetch): Promise<T> {
	return answer<T>(await send(fetcher, path, { headers: { accept: 'application/json' } }));
}

/**
 * Write to the JSON API. `key` names this one write: sent again with the same key it is done once, so a caller
 * that retries must keep it. See {@link newKey}.
 */
export async function postJson<T>(path: string, body: unknown, key: string): Promise<T> {
	const headers = { 'content-type': 'application/json', 'idempotency-key': key };
	return answer<T>(await send(fetch, path, { method: 'POST', headers, body: JSON.stringify(body) }));
}

export function newKey(): string {
	return v7();
}

async function send(fetcher: typeof fetch, path: string, init: RequestInit): Promise<Response> {
	try {
		return await fetcher(path, init);
	} catch {
		const code = deviceIsOffline() ? 'offline' : 'network';
		throw new ApiProblem(0, code, 'The server cannot be reached. Nothing is lost; try again.');
	}
}

/** Whether the device itself says that it has no network. */
function deviceIsOffline(): boolean {
	return typeof navigator !== 'undefined' && navigator.onLine === false;
}

async function answer<T>(response: Response): Promise<T> {
	if (response.ok) {
		return (response.status === 204 ? null : await response.json()) as T;
	}
	const body = (await response.json().catch(() => ({}))) as Record<string, unknown>;
	throw new ApiProblem(
		response.status,
		typeof body.type === 'string' ? body.type : 'unknown',
		typeof body.detail === 'string' ? body.detail : m.common_error_status({ status: response.status }),
		body
	);
}
