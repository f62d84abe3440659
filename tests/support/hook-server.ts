import { createServer, type IncomingMessage } from 'node:http';
import type { AddressInfo } from 'node:net';
import type { RequestEvent } from '@sveltejs/kit';
import { sign } from '../../src/fakes/gateway/webhook';
import { POST as sms } from '../../src/routes/api/hooks/sms/+server';
import { POST as status } from '../../src/routes/api/hooks/sms-status/+server';
import { POST as voice } from '../../src/routes/api/hooks/voice/+server';
import { POST as voiceStatus } from '../../src/routes/api/hooks/voice-status/+server';
import { HOSPITAL_NOW } from './hospital';

type Handler = (event: RequestEvent) => Response | Promise<Response>;

/** The real handlers of the gateway's calls behind a plain server, so that the fakes can post to them. */
export interface HookServer {
	url: string;
	/** What the handlers take for the present. */
	now: number;
	close(): Promise<void>;
}

const HANDLERS: Record<string, Handler> = {
	'/api/hooks/sms': sms as Handler,
	'/api/hooks/sms-status': status as Handler,
	'/api/hooks/voice': voice as Handler,
	'/api/hooks/voice-status': voiceStatus as Handler
};

export async function serveHooks(): Promise<HookServer> {
	const hooks = { url: '', now: HOSPITAL_NOW, close: () => Promise.resolve() };
	const server = createServer((incoming, outgoing) => {
		void (async () => {
			const request = await requestOf(incoming, hooks.url);
			const answer = await callHook(request, hooks.now);
			outgoing.writeHead(answer.status, Object.fromEntries(answer.headers)).end(await answer.text());
		})();
	});
	await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
	hooks.url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
	hooks.close = () =>
		new Promise<void>((resolve) => {
			server.close(() => resolve());
			server.closeAllConnections();
		});
	return hooks;
}

/** Hand one request to the handler of its path. */
export async function callHook(request: Request, now = HOSPITAL_NOW): Promise<Response> {
	const url = new URL(request.url);
	const handler = HANDLERS[url.pathname];
	if (!handler) {
		return new Response(null, { status: 404 });
	}
	const context = { actor: null, now, address: '127.0.0.1', key: null };
	return handler({ request, url, locals: { context } } as unknown as RequestEvent);
}

/**
 * A post as the gateway makes it, signed for `publicUrl`.
 * @param change what is put in the place of the right thing
 */
export function signedPost(
	publicUrl: string,
	path: string,
	fields: Record<string, string>,
	change: { signature?: string | null; token?: string; signedUrl?: string; host?: string } = {}
): Request {
	const token = change.token ?? 'ropewalk-demo-token';
	const right = sign(token, change.signedUrl ?? publicUrl + path, fields);
	const signature = change.signature === undefined ? right : change.signature;
	return new Request(`${change.host ?? publicUrl}${path}`, {
		method: 'POST',
		headers: {
			'Content-Type': 'application/x-www-form-urlencoded; charset=UTF-8',
			...(signature === null ? {} : { 'X-Twilio-Signature': signature })
		},
		body: new URLSearchParams(fields)
	});
}

async function requestOf(incoming: IncomingMessage, base: string): Promise<Request> {
	const chunks: Buffer[] = [];
	for await (const chunk of incoming as AsyncIterable<Buffer>) {
		chunks.push(chunk);
	}
	return new Request(base + (incoming.url ?? ''), {
		method: incoming.method,
		headers: Object.entries(incoming.headers).flatMap(([name, value]): [string, string][] =>
			typeof value === 'string' ? [[name, value]] : []
		),
		body: Buffer.concat(chunks)
	});
}
