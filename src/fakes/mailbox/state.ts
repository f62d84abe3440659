import { randomBytes } from 'node:crypto';
import type { Fault } from '../common/faults';

export const MAIL_MODES = ['ok', 'greylist', 'reject', 'drop'] as const;
export type MailMode = (typeof MAIL_MODES)[number];

/** A file that came with a mail. */
export interface MailFile {
	filename: string | null;
	contentType: string;
	/** What a calendar part is for, as its header states; null for any other. */
	method: string | null;
	content: Buffer;
}

/** A mail as it arrived; `to` are the addresses of the envelope, which no header can hide. */
export interface Mail {
	id: string;
	at: number;
	from: string;
	to: string[];
	subject: string;
	text: string;
	html: string | null;
	files: MailFile[];
}

export interface Mailbox {
	fault: Fault<MailMode>;
	mails: Mail[];
	/** Differs after a restart, when the count of mails begins again. */
	boot: string;
}

/** An empty mailbox. Everything is kept in memory and is gone with the process. */
export function createMailbox(): Mailbox {
	return { fault: { mode: 'ok', left: null }, mails: [], boot: randomBytes(6).toString('hex') };
}
