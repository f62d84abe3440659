import RequestClient from 'twilio/lib/base/RequestClient.js';
import type Response from 'twilio/lib/http/response.js';

/** One attempt may take this long; a gateway that has not answered by then has perhaps sent the message. */
export const GATEWAY_LIMIT_MS = 8_000;

/** What the SDK's own error leaves out: how long the gateway asks to wait. */
export class GatewayRefusal extends Error {
	constructor(
		readonly status: number,
		/** The gateway's own number of the error. */
		readonly code: number | null,
		/** The `Retry-After` header as it came. */
		readonly retryAfter: string | null
	) {
		super(`The gateway answered ${status}.`);
	}
}

/**
 * The SDK's way to the network, with two changes: a base address of our own (the stand-in of the demonstration),
 * and every refusal as a {@link GatewayRefusal}. The SDK's own retry is off; the outbox has its own schedule.
 */
export class GatewayClient extends RequestClient {
	constructor(
		private readonly baseUrl: string | null,
		limitMs: number
	) {
		// A kept connection may be closed by the other end just when the next message is written to it, and that
		// looks exactly like a message of unknown outcome. A new one for each message costs little.
		super({ timeout: limitMs, autoRetry: false, keepAlive: false });
	}

	override async request<T>(options: RequestClient.RequestOptions<T>): Promise<Response<T>> {
		const response = await super.request<T>({ ...options, uri: this.#rebased(options.uri) });
		if (response.statusCode >= 300) {
			throw new GatewayRefusal(response.statusCode, codeOf(response.body), retryAfterOf(response));
		}
		return response;
	}

	#rebased(uri: string): string {
		if (this.baseUrl === null) {
			return uri;
		}
		const { pathname, search } = new URL(uri);
		return this.baseUrl + pathname + search;
	}
}

/** The body of a refusal is not trusted: it may be a page in HTML from something in between. */
function codeOf(body: unknown): number | null {
	const code = typeof body === 'object' && body !== null ? (body as { code?: unknown }).code : null;
	return typeof code === 'number' && Number.isSafeInteger(code) ? code : null;
}

function retryAfterOf(response: Response<unknown>): string | null {
	const value: unknown = response.headers?.['retry-after'];
	return typeof value === 'string' ? value : null;
}
