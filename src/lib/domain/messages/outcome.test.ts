import { describe, expect, it } from 'vitest';
import { mailOutcome, smsOutcome } from './outcome';

function answered(status: number, change: { id?: string; code?: number; retryAfter?: number } = {}) {
	const { id = null, code = null, retryAfter = null } = change;
	return smsOutcome({ kind: 'answered', status, id, code, retryAfter });
}

describe('smsOutcome', () => {
	it.each([
		[200, 'SM1'],
		[201, 'SM1'],
		[299, 'SM1']
	])('%i with an id is accepted', (status, id) => {
		expect(answered(status, { id })).toEqual({ kind: 'accepted', id });
	});

	it.each([
		[200, 'answer-without-id'],
		[201, 'answer-without-id'],
		[408, 'no-answer'],
		[504, 'no-answer']
	])('%i without an id is unknown: %s', (status, reason) => {
		expect(answered(status)).toEqual({ kind: 'unknown', reason });
		expect(answered(status, { id: '' })).toEqual({ kind: 'unknown', reason });
	});

	it.each(['ECONNABORTED', 'ETIMEDOUT', 'ECONNRESET', 'EPIPE', 'ERR_BAD_RESPONSE', 'SOMETHING_NEW', null])(
		'%s may have reached the gateway: unknown',
		(code) => {
			expect(smsOutcome({ kind: 'failed', code })).toEqual({ kind: 'unknown', reason: 'no-answer' });
		}
	);

	it.each([
		[401, 'credentials'],
		[429, 'busy'],
		[500, 'gateway-down'],
		[502, 'gateway-down'],
		[503, 'gateway-down']
	])('%i is transient: %s', (status, reason) => {
		expect(answered(status)).toEqual({ kind: 'transient', reason, retryAfter: null });
		expect(answered(status, { retryAfter: 2000 })).toEqual({ kind: 'transient', reason, retryAfter: 2000 });
	});

	it.each([
		'ECONNREFUSED',
		'ENOTFOUND',
		'EAI_AGAIN',
		'EHOSTUNREACH',
		'ENETUNREACH',
		'CERT_HAS_EXPIRED',
		'DEPTH_ZERO_SELF_SIGNED_CERT',
		'UNABLE_TO_VERIFY_LEAF_SIGNATURE'
	])('%s never reached the gateway', (code) => {
		expect(smsOutcome({ kind: 'failed', code })).toEqual({
			kind: 'transient',
			reason: 'not-reached',
			retryAfter: null
		});
	});

	it.each([
		[400, 21610, 'opted-out'],
		[400, 21211, 'bad-address'],
		[400, 21614, 'bad-address'],
		[400, 21602, 'refused'],
		[400, undefined, 'refused'],
		[403, undefined, 'refused'],
		[404, undefined, 'refused'],
		[499, undefined, 'refused']
	])('%i with code %s is permanent: %s', (status, code, reason) => {
		expect(answered(status, code === undefined ? {} : { code })).toEqual({ kind: 'permanent', reason });
	});
});

describe('mailOutcome', () => {
	const failed = (code: string | null, reply: number | null, command: string | null, syscall?: string) =>
		mailOutcome({ kind: 'failed', code, reply, command, syscall: syscall ?? null });

	it('accepts what the server took', () => {
		expect(mailOutcome({ kind: 'answered', id: '<a@b>' })).toEqual({ kind: 'accepted', id: '<a@b>' });
	});

	it.each([
		['greylisted', 'EENVELOPE', 451, 'RCPT TO', 'try-later'],
		['closing', 'EENVELOPE', 421, 'MAIL FROM', 'try-later'],
		['the content put off', 'EMESSAGE', 499, 'DATA', 'try-later'],
		['wrong credentials', 'EAUTH', 535, 'AUTH PLAIN', 'credentials'],
		['no encryption', 'ETLS', null, 'STARTTLS', 'no-encryption']
	])('%s is transient', (_, code, reply, command, reason) => {
		expect(failed(code, reply, command)).toEqual({ kind: 'transient', reason, retryAfter: null });
	});

	// Codes, commands and system calls as nodemailer reports them.
	it.each([
		['nobody listens', 'ESOCKET', 'connect'],
		['name not found', 'EDNS', 'getaddrinfo']
	])('%s: never reached', (_, code, syscall) => {
		expect(failed(code, null, 'CONN', syscall)).toEqual({
			kind: 'transient',
			reason: 'not-reached',
			retryAfter: null
		});
	});

	it.each([
		['no such mailbox', 'EENVELOPE', 550, 'RCPT TO', 'bad-address'],
		['the content refused', 'EMESSAGE', 554, 'DATA', 'refused'],
		['the sender refused', 'EENVELOPE', 500, 'MAIL FROM', 'refused']
	])('%s is permanent', (_, code, reply, command, reason) => {
		expect(failed(code, reply, command)).toEqual({ kind: 'permanent', reason });
	});

	it.each([
		['dropped at any stage', 'ECONNECTION', 'CONN', undefined],
		['silent at any stage', 'ETIMEDOUT', 'CONN', undefined],
		['reset', 'ESOCKET', 'CONN', 'read'],
		['nothing known', null, null, undefined]
	])('%s is unknown', (_, code, command, syscall) => {
		expect(failed(code, null, command, syscall)).toEqual({ kind: 'unknown', reason: 'no-answer' });
	});
});
