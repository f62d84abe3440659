import type { Socket } from 'node:net';
import { simpleParser } from 'mailparser';
import { SMTPServer, type SMTPServerDataStream, type SMTPServerSession } from 'smtp-server';
import { takeFault } from '../common/faults';
import type { Mailbox, MailMode } from './state';

const SIZE_LIMIT_BYTES = 25 * 1024 * 1024;

/**
 * An SMTP server on loopback that keeps what it is given. Any sign-in is accepted, and none is needed. A fault is
 * taken once for each mail, when its sender is named, and carried out at the recipients or after the text.
 */
export function createSmtp(mailbox: Mailbox): SMTPServer {
	const modes = new Map<string, MailMode>();
	const sockets = new Map<number, Socket>();
	const smtp = new SMTPServer({
		authOptional: true,
		allowInsecureAuth: true,
		disabledCommands: ['STARTTLS'],
		disableReverseLookup: true,
		size: SIZE_LIMIT_BYTES,
		onAuth: (auth, _session, done) => done(null, { user: auth.username ?? 'anyone' }),
		onMailFrom: (_address, session, done) => {
			modes.set(session.id, takeFault<MailMode>(mailbox.fault));
			done();
		},
		onRcptTo: (_address, session, done) => done(refusalOf(modes.get(session.id))),
		onData: (stream, session, done) => {
			// The text is taken whole before the connection is cut, so that the sender cannot know what became of it.
			const cut = modes.get(session.id) === 'drop' ? sockets.get(session.remotePort) : undefined;
			receive(mailbox, stream, session, cut).then(() => done(), done);
		},
		onClose: (session) => void modes.delete(session.id)
	});
	smtp.server.on('connection', (socket) => rememberSocket(sockets, socket));
	return smtp;
}

function rememberSocket(sockets: Map<number, Socket>, socket: Socket): void {
	const port = socket.remotePort ?? 0;
	sockets.set(port, socket);
	socket.once('close', () => sockets.delete(port));
}

function refusalOf(mode: MailMode | undefined): Error | null {
	switch (mode) {
		case 'greylist':
			return smtpError(451, 'Greylisted, please try again later');
		case 'reject':
			return smtpError(550, 'Mailbox is not available');
		default:
			return null;
	}
}

function smtpError(responseCode: number, message: string): Error {
	return Object.assign(new Error(message), { responseCode });
}

async function receive(
	mailbox: Mailbox,
	stream: SMTPServerDataStream,
	{ envelope }: SMTPServerSession,
	cut: Socket | undefined
): Promise<void> {
	const parsed = await simpleParser(stream);
	if (stream.sizeExceeded) {
		throw smtpError(552, `A mail may have ${SIZE_LIMIT_BYTES} bytes`);
	}
	if (cut) {
		cut.destroy();
		return;
	}
	mailbox.mails.push({
		id: String(mailbox.mails.length + 1),
		at: Date.now(),
		from: envelope.mailFrom ? envelope.mailFrom.address : '',
		to: envelope.rcptTo.map(({ address }) => address),
		subject: parsed.subject ?? '',
		text: parsed.text ?? '',
		html: parsed.html || null,
		files: parsed.attachments.map(({ filename, contentType, content, headers }) => ({
			filename: filename ?? null,
			contentType,
			method: methodOf(headers.get('content-type')),
			content
		}))
	});
}

/** The method that the header of a calendar part states; null for any other part. */
function methodOf(header: unknown): string | null {
	const { params } = (header ?? {}) as { params?: Record<string, string> };
	return params?.method ?? null;
}
