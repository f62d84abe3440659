/** Addresses of mails. They are handed over as objects only: a text could smuggle in a second receiver. */
export interface MailAddress {
	name: string;
	address: string;
}

/** One mailbox and nothing else: no blanks, no control characters, no comma, no brackets, one `@`. */
const ADDRESS = /^[^\s\p{Cc},;:<>()[\]"\\@]{1,64}@[^\s\p{Cc},;:<>()[\]"\\@]{1,255}$/u;

/** The address as an object, or null when it is not one mailbox. */
export function mailAddress(address: string, name: string | null): MailAddress | null {
	return ADDRESS.test(address) ? { address, name: (name ?? '').replace(/\p{Cc}+/gu, ' ').trim() } : null;
}

/**
 * Read a sender as it stands in the configuration: `Name <address>` or the address alone.
 * @throws Error that names the value
 */
export function readSender(configured: string): MailAddress {
	const [, name = '', inside] = /^\s*"?([^"<]*?)"?\s*<([^<>]+)>\s*$/.exec(configured) ?? [];
	const sender = mailAddress(inside ?? configured.trim(), inside === undefined ? '' : name);
	if (!sender) {
		throw new Error(`MAIL_FROM is '${configured}': it must be an address, or a name and <address>.`);
	}
	return sender;
}
