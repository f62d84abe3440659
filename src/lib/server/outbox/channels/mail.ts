import nodemailer, { type Transporter } from 'nodemailer';
import { mailOutcome } from '$lib/domain/messages/outcome';
import { methodOf } from '$lib/domain/visits/calendar';
import type { Env } from '../../env';
import type { Channel, Outgoing, Sent } from './channel';
import { mailAddress, readSender, type MailAddress } from './mail-address';
import { htmlOf } from './mail-html';

interface MailLimits {
	/** To be connected, and to be greeted. */
	connectMs: number;
	/** Silence of the server in the middle of the exchange. */
	silenceMs: number;
}

const LIMITS: MailLimits = { connectMs: 5_000, silenceMs: 8_000 };

/**
 * Mails over SMTP, encrypted where the configuration demands it.
 * @param publicUrl its host stands in the identifiers of mails
 * @throws Error when the configured sender is no address
 */
export function mailChannel(
	gateway: NonNullable<Env['mail']>,
	publicUrl: string,
	{ connectMs, silenceMs }: MailLimits = LIMITS
): Channel {
	const from = readSender(gateway.from);
	const host = new URL(publicUrl).hostname;
	const transport = nodemailer.createTransport({
		url: gateway.url,
		requireTLS: gateway.requireTls,
		connectionTimeout: connectMs,
		dnsTimeout: connectMs,
		greetingTimeout: connectMs,
		socketTimeout: silenceMs,
		disableFileAccess: true,
		disableUrlAccess: true
	});
	// A mail server cannot be asked what became of a mail; the receiving side knows a second copy by its identifier.
	return {
		send: (message) => send(transport, from, host, message),
		lookUp: null,
		probe: () =>
			transport.verify().then(
				() => true,
				() => false
			)
	};
}

async function send(
	transport: Transporter,
	from: MailAddress,
	host: string,
	{ id, to, name, language, subject, body, calendar }: Outgoing
): Promise<Sent> {
	const receiver = mailAddress(to, name);
	if (!receiver) {
		return { outcome: { kind: 'permanent', reason: 'bad-address' }, code: 'not-an-address' };
	}
	const messageId = `<${id}@${host}>`;
	try {
		await transport.sendMail({
			messageId,
			from,
			to: receiver,
			subject: subject ?? '',
			text: body,
			html: htmlOf(body, language ?? 'en'),
			...withCalendar(calendar ?? null),
			headers: { 'Auto-Submitted': 'auto-generated' }
		});
		return { outcome: mailOutcome({ kind: 'answered', id: messageId }), code: null };
	} catch (error) {
		return judgedError(error);
	}
}

/** The file as an answerable part of the mail and as an attachment, both with the method that it states itself. */
function withCalendar(content: string | null) {
	const method = content === null ? null : methodOf(content);
	return content === null || method === null ? {} : { icalEvent: { method, filename: 'visit.ics', content } };
}

function judgedError(error: unknown): Sent {
	const { code, responseCode, command, syscall } = (error ?? {}) as Record<string, unknown>;
	const reply = typeof responseCode === 'number' ? responseCode : null;
	const known = textOf(code);
	const outcome = mailOutcome({
		kind: 'failed',
		code: known,
		reply,
		command: textOf(command),
		syscall: textOf(syscall)
	});
	return { outcome, code: reply === null ? known : String(reply) };
}

function textOf(value: unknown): string | null {
	return typeof value === 'string' ? value : null;
}
