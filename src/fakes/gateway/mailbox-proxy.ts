import { request as requestHttp } from 'node:http';
import { Refusal, type Exchange, type Route } from '../common/http';

const PASSED_ON = ['content-type', 'if-none-match'];

/**
 * Shows the mail fake below `/mailbox`, so that the page reads phones and mailbox from one origin.
 * @param mailPort the HTTP side of the mail fake.
 */
export function mailboxRoutes(mailPort: number): Route[] {
	const pass = (exchange: Exchange) => passOn(mailPort, exchange);
	return [
		['GET', /^\/mailbox(\/.+)$/, pass],
		['PUT', /^\/mailbox(\/.+)$/, pass]
	];
}

function passOn(port: number, { request, response, url }: Exchange): Promise<void> {
	const headers = Object.fromEntries(
		PASSED_ON.flatMap((name) => (request.headers[name] ? [[name, request.headers[name]]] : []))
	);
	const path = url.pathname.slice('/mailbox'.length);
	return new Promise((resolve, reject) => {
		const { method } = request;
		const onward = requestHttp({ host: '127.0.0.1', port, path, method, headers }, (answer) => {
			response.writeHead(answer.statusCode ?? 502, answer.headers);
			answer.pipe(response).once('close', resolve);
		});
		onward.once('error', () => reject(new Refusal(502, `The mail fake does not answer on port ${port}.`)));
		request.pipe(onward);
	});
}
