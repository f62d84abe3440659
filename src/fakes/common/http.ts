import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http';
import type { Server as NetServer } from 'node:net';

/** One request as a handler sees it. `parts` are the decoded groups of the route's pattern. */
export interface Exchange {
	request: IncomingMessage;
	response: ServerResponse;
	url: URL;
	parts: string[];
}

export type Handler = (exchange: Exchange) => Promise<void> | void;
export type Route = readonly [method: string, path: RegExp, handle: Handler];

/** A request that cannot be served: the status and what to tell the caller. */
export class Refusal extends Error {
	constructor(
		readonly status: number,
		detail: string
	) {
		super(detail);
	}
}

const BODY_LIMIT_BYTES = 1024 * 1024;

/** An HTTP server over a table of routes; the first that fits method and path answers. */
export function createFake(routes: readonly Route[]): Server {
	return createServer((request, response) => {
		answer(routes, request, response).catch((error: unknown) => fail(response, error));
	});
}

/** Listens on loopback only. A taken port ends the process with a sentence naming the port and its variable. */
export function listen(server: NetServer, port: number, variable: string): Promise<void> {
	return new Promise((resolve) => {
		server.once('error', (error: NodeJS.ErrnoException) => {
			const taken = `Port ${port} is taken. Choose another one with ${variable}.`;
			console.error(error.code === 'EADDRINUSE' ? taken : error.message);
			process.exit(1);
		});
		server.listen(port, '127.0.0.1', resolve);
	});
}

/** Answers with JSON. */
export function sendJson(
	response: ServerResponse,
	status: number,
	value: unknown,
	headers: Record<string, string> = {}
): void {
	response.writeHead(status, { 'Content-Type': 'application/json; charset=utf-8', ...headers });
	response.end(JSON.stringify(value));
}

/** Answers with JSON under an entity tag, or 304 when the caller has seen this version already. */
export function sendTagged({ request, response }: Exchange, tag: string, value: () => unknown): void {
	if (request.headers['if-none-match'] === tag) {
		response.writeHead(304, { ETag: tag }).end();
		return;
	}
	sendJson(response, 200, value(), { ETag: tag, 'Cache-Control': 'no-cache' });
}

/** The body as an object. @throws Refusal 400 when it is not JSON or not an object, 413 over one mebibyte. */
export async function readJson(request: IncomingMessage): Promise<Record<string, unknown>> {
	const text = await readText(request);
	try {
		const value: unknown = JSON.parse(text);
		if (typeof value === 'object' && value !== null && !Array.isArray(value)) {
			return value as Record<string, unknown>;
		}
	} catch {
		// Told below, together with JSON that is no object.
	}
	throw new Refusal(400, 'The body must be a JSON object.');
}

/** The body as form fields. @throws Refusal 413 over one mebibyte. */
export async function readForm(request: IncomingMessage): Promise<URLSearchParams> {
	return new URLSearchParams(await readText(request));
}

async function readText(request: IncomingMessage): Promise<string> {
	return (await readBytes(request)).toString('utf8');
}

/** The body as it came. @throws Refusal 413 over one mebibyte. */
export async function readBytes(request: IncomingMessage): Promise<Buffer> {
	const chunks: Buffer[] = [];
	let bytes = 0;
	for await (const chunk of request as AsyncIterable<Buffer>) {
		bytes += chunk.length;
		if (bytes > BODY_LIMIT_BYTES) {
			throw new Refusal(413, `The body is over ${BODY_LIMIT_BYTES} bytes.`);
		}
		chunks.push(chunk);
	}
	return Buffer.concat(chunks);
}

async function answer(
	routes: readonly Route[],
	request: IncomingMessage,
	response: ServerResponse
): Promise<void> {
	const url = new URL(request.url ?? '/', 'http://127.0.0.1');
	refuseForeignPage(request);
	const here = routes.filter(([, path]) => path.test(url.pathname));
	const route = here.find(([method]) => method === request.method);
	if (!route) {
		throw new Refusal(here.length > 0 ? 405 : 404, `${request.method} ${url.pathname} is not served here.`);
	}
	const [, path, handle] = route;
	const parts = (path.exec(url.pathname) ?? []).slice(1).map((part) => decodePart(part));
	await handle({ request, response, url, parts });
}

function decodePart(part: string): string {
	try {
		return decodeURIComponent(part);
	} catch {
		throw new Refusal(400, `'${part}' is not a well-formed part of an address.`);
	}
}

/** A page from elsewhere, open in the same browser, must not send messages through the fakes. */
function refuseForeignPage(request: IncomingMessage): void {
	const origin = request.headers.origin;
	if (origin && !/^https?:\/\/(127\.0\.0\.1|localhost)(:\d+)?$/.test(origin)) {
		throw new Refusal(403, `Requests from ${origin} are not served.`);
	}
}

function fail(response: ServerResponse, error: unknown): void {
	if (!(error instanceof Refusal)) {
		console.error(error);
	}
	if (response.headersSent || response.destroyed) {
		response.destroy();
		return;
	}
	const status = error instanceof Refusal ? error.status : 500;
	const detail = error instanceof Error ? error.message : 'Something went wrong.';
	sendJson(response, status, { status, detail });
}
