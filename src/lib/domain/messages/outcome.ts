/**
 * What became of an attempt to send, judged from what the gateway answered or how the connection failed.
 *
 * The line that matters runs between 'not sent' (try again) and 'perhaps sent' (`unknown`: ask the gateway before
 * anything is sent twice). Whatever is not recognised is unknown. Codes decide, never the gateway's prose.
 */

export type PermanentReason = 'opted-out' | 'bad-address' | 'refused' | 'gone';
export type TransientReason =
	'busy' | 'gateway-down' | 'credentials' | 'no-encryption' | 'not-reached' | 'try-later';
export type UnknownReason = 'no-answer' | 'answer-without-id';

/** Reasons that lie with the way out and not with one message: the next message would meet the same. */
export const TROUBLE_REASONS: readonly (TransientReason | UnknownReason)[] = [
	'busy',
	'gateway-down',
	'credentials',
	'no-encryption',
	'not-reached',
	'no-answer',
	'answer-without-id'
];

export type Outcome =
	| { readonly kind: 'accepted'; readonly id: string }
	| { readonly kind: 'permanent'; readonly reason: PermanentReason }
	| { readonly kind: 'transient'; readonly reason: TransientReason; readonly retryAfter: number | null }
	| { readonly kind: 'unknown'; readonly reason: UnknownReason };

/** How the call to the SMS or voice gateway ended. */
export type SmsResult =
	| {
			readonly kind: 'answered';
			readonly status: number;
			/** The identifier the gateway gave the message. */
			readonly id: string | null;
			/** The gateway's own code of the error. */
			readonly code: number | null;
			/** Milliseconds from the `Retry-After` header. */
			readonly retryAfter: number | null;
	  }
	/** No answer: the error code of the connection, such as `ECONNREFUSED`. */
	| { readonly kind: 'failed'; readonly code: string | null };

/** The receiver has said STOP to the gateway. */
const OPTED_OUT_CODES = [21610];
/** No number, not a mobile number, not reachable from here, a landline. */
const BAD_NUMBER_CODES = [21211, 21214, 21217, 21401, 21407, 21612, 21614];
/** Nothing was sent: name not found, nobody listening, no route, certificate refused. */
const NOT_REACHED =
	/^(ECONNREFUSED|ENOTFOUND|EAI_|EHOSTUNREACH|ENETUNREACH|CERT_|ERR_TLS_|DEPTH_ZERO_|SELF_SIGNED_|UNABLE_TO_)/;

/** Judge the end of a call to the SMS gateway. */
export function smsOutcome(result: SmsResult): Outcome {
	if (result.kind === 'failed') {
		return result.code !== null && NOT_REACHED.test(result.code)
			? { kind: 'transient', reason: 'not-reached', retryAfter: null }
			: { kind: 'unknown', reason: 'no-answer' };
	}
	const { status, id, code, retryAfter } = result;
	if (status >= 200 && status < 300) {
		return id ? { kind: 'accepted', id } : { kind: 'unknown', reason: 'answer-without-id' };
	}
	// A time-out somewhere behind the gateway's door: the message may have gone through it.
	if (status === 408 || status === 504) {
		return { kind: 'unknown', reason: 'no-answer' };
	}
	const reason = transientReason(status);
	return reason === null
		? { kind: 'permanent', reason: permanentReason(code) }
		: { kind: 'transient', reason, retryAfter };
}

/** The device has taken its permission away, or its service has never heard of it: RFC 8030 section 7.3. */
const GONE_STATUSES = [404, 410];

/** Judge the end of a call to a push service. Its codes are those of HTTP, so the rest is as with texts. */
export function pushOutcome(result: SmsResult): Outcome {
	return result.kind === 'answered' && GONE_STATUSES.includes(result.status)
		? { kind: 'permanent', reason: 'gone' }
		: smsOutcome(result);
}

/** Wrong credentials are the hospital's fault and not the message's: it waits until they are put right. */
function transientReason(status: number): TransientReason | null {
	if (status === 401) {
		return 'credentials';
	}
	if (status === 429) {
		return 'busy';
	}
	return status >= 500 ? 'gateway-down' : null;
}

function permanentReason(code: number | null): PermanentReason {
	if (code !== null && OPTED_OUT_CODES.includes(code)) {
		return 'opted-out';
	}
	return code !== null && BAD_NUMBER_CODES.includes(code) ? 'bad-address' : 'refused';
}

/** An exchange with the mail server that did not end well. */
export interface MailFailure {
	readonly kind: 'failed';
	/** The error code of the mail client: `EENVELOPE`, `ETIMEDOUT`, `EAUTH`, ... */
	readonly code: string | null;
	/** The server's reply code, 400 to 599. */
	readonly reply: number | null;
	/** The command that was answered: `MAIL FROM`, `RCPT TO`, `DATA`, ... */
	readonly command: string | null;
	/** The call to the system that failed: `connect`, `getaddrinfo`, `read`, ... */
	readonly syscall: string | null;
}

/** How the exchange with the mail server ended. */
export type MailResult = { readonly kind: 'answered'; readonly id: string } | MailFailure;

/**
 * Judge the end of an exchange with the mail server. The mail client names no stage for a connection that broke
 * or fell silent, so only one that was never made counts as not reached. A mail whose fate is unknown is sent
 * again with the same Message-ID, so that the receiving side can tell.
 */
export function mailOutcome(result: MailResult): Outcome {
	if (result.kind === 'answered') {
		return { kind: 'accepted', id: result.id };
	}
	const { reply, command } = result;
	const transient = transientMailReason(result);
	if (transient !== null) {
		return { kind: 'transient', reason: transient, retryAfter: null };
	}
	return reply !== null && reply >= 500
		? { kind: 'permanent', reason: command?.startsWith('RCPT') ? 'bad-address' : 'refused' }
		: { kind: 'unknown', reason: 'no-answer' };
}

function transientMailReason({ code, reply, syscall }: MailFailure): TransientReason | null {
	if (code === 'EAUTH') {
		return 'credentials';
	}
	if (code === 'ETLS') {
		return 'no-encryption';
	}
	if (reply !== null) {
		return reply < 500 ? 'try-later' : null;
	}
	return code === 'EDNS' || syscall === 'connect' || syscall === 'getaddrinfo' ? 'not-reached' : null;
}
