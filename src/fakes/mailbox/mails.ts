import { Refusal, sendTagged, type Exchange, type Route } from '../common/http';
import type { Mail, Mailbox, MailFile } from './state';

/** The side for people and tests: look at the mails, oldest first, and open what came with them. */
export function mailRoutes(mailbox: Mailbox): Route[] {
	return [
		[
			'GET',
			/^\/mails$/,
			(exchange) => {
				const tag = `"${mailbox.boot}-${mailbox.mails.length}"`;
				sendTagged(exchange, tag, () => ({ items: mailbox.mails.map(viewMail) }));
			}
		],
		['GET', /^\/mails\/(\d+)\/attachments\/(\d+)$/, (exchange) => sendFile(mailbox, exchange)]
	];
}

/** `to` is one text with all addresses of the envelope; contents of attachments are base64. */
function viewMail({ id, at, from, to, subject, text, html, files }: Mail): unknown {
	const attachments = files.map(({ filename, contentType, method, content }) => ({
		filename,
		contentType,
		method,
		size: content.length,
		content: content.toString('base64')
	}));
	return { id, at: new Date(at).toISOString(), from, to: to.join(', '), subject, text, html, attachments };
}

/** Always as a download of unknown kind: what came by mail must not run on this origin. */
function sendFile(mailbox: Mailbox, { response, parts }: Exchange): void {
	const file: MailFile | undefined = mailbox.mails.find(({ id }) => id === parts[0])?.files[Number(parts[1])];
	if (!file) {
		throw new Refusal(404, 'There is no such attachment.');
	}
	const name = encodeURIComponent(file.filename ?? 'attachment').replace(/'/g, '%27');
	response.writeHead(200, {
		'Content-Type': 'application/octet-stream',
		'Content-Disposition': `attachment; filename*=UTF-8''${name}`,
		'X-Content-Type-Options': 'nosniff'
	});
	response.end(file.content);
}
