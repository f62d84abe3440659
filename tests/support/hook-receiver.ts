import { createServer, type IncomingHttpHeaders } from 'node:http';
import type { AddressInfo } from 'node:net';
import twilio from 'twilio';

/** The token that the fakes sign with when nothing else is set. */
export const TOKEN = 'ropewalk-demo-token';

/** One webhook as it arrived. */
export interface Hook {
	/** Path and query. */
	path: string;
	headers: IncomingHttpHeaders;
	fields: Record<string, string>;
}

/** A plain server that stands where the application would, for tests of the fakes alone. */
export interface HookReceiver {
	url: string;
	/** Every webhook so far, in the order of arrival. */
	hooks: Hook[];
	/** What it answers with. */
	answer: { status: number; body: string };
	/** Resolves as soon as so many webhooks of this path and query have arrived, at once when they have already. */
	arrived(path: string, count: number): Promise<Hook[]>;
	/** Whether the SDK's own check accepts the signature of a webhook. */
	isSigned(hook: Hook): boolean;
	close(): Promise<void>;
}

/** Starts a receiver on a free port of loopback. */
export async function receiveHooks(port = 0): Promise<HookReceiver> {
	const hooks: Hook[] = [];
	const answer = { status: 200, body: '' };
	const waiting = new Set<() => void>();
	const server = createServer((request, response) => {
		let body = '';
		request.setEncoding('utf8').on('data', (text: string) => (body += text));
		request.on('end', () => {
			const fields = Object.fromEntries(new URLSearchParams(body));
			hooks.push({ path: request.url ?? '', headers: request.headers, fields });
			response.writeHead(answer.status, { 'Content-Type': 'text/xml' }).end(answer.body);
			waiting.forEach((check) => check());
		});
	});
	await new Promise<void>((resolve) => server.listen(port, '127.0.0.1', resolve));
	const arrived = (path: string, count: number) =>
		new Promise<Hook[]>((resolve) => {
			const check = () => {
				const found = hooks.filter((hook) => hook.path === path);
				if (found.length >= count) {
					waiting.delete(check);
					resolve(found);
				}
			};
			waiting.add(check);
			check();
		});
	const close = () =>
		new Promise<void>((resolve) => {
			server.close(() => resolve());
			server.closeAllConnections();
		});
	const { port: own } = server.address() as AddressInfo;
	const url = `http://127.0.0.1:${own}`;
	const isSigned = ({ path, headers, fields }: Hook) =>
		twilio.validateRequest(TOKEN, String(headers['x-twilio-signature']), url + path, fields);
	return { url, hooks, answer, arrived, isSigned, close };
}
