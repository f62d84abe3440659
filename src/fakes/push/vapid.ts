import { createPublicKey, verify } from 'node:crypto';

const DAY_SECONDS = 24 * 60 * 60;
const POINT_BYTES = 65;

/**
 * Who sends, by RFC 8292: a token that is signed, meant for this service, and good for a day at most.
 * @param origin of this service
 * @returns the sender's public key
 * @throws Error that says what is wrong with it
 */
export function senderOf(authorization: string, origin: string, now: number): string {
	const token = /^vapid .*\bt=([\w.-]+)/.exec(authorization)?.[1] ?? '';
	const key = /^vapid .*\bk=([\w-]+)/.exec(authorization)?.[1] ?? '';
	const [header = '', claims = '', signature = ''] = token.split('.');
	if (!signature || readJson(header).alg !== 'ES256') {
		throw new Error('No signed token of the sender.');
	}
	const options = { key: publicKey(key), dsaEncoding: 'ieee-p1363' } as const;
	if (!verify('sha256', Buffer.from(`${header}.${claims}`), options, Buffer.from(signature, 'base64url'))) {
		throw new Error('The signature of the token does not fit its key.');
	}
	const { aud, exp, sub } = readJson(claims);
	const seconds = now / 1000;
	if (aud !== origin) {
		throw new Error(`The token is meant for ${String(aud)}, not for ${origin}.`);
	}
	if (typeof exp !== 'number' || exp <= seconds || exp > seconds + DAY_SECONDS) {
		throw new Error('The token is out of date, or good for more than a day.');
	}
	if (typeof sub !== 'string' || !/^(mailto:|https:)/.test(sub)) {
		throw new Error('The token does not say whom to write to.');
	}
	return key;
}

function readJson(part: string): Record<string, unknown> {
	return JSON.parse(Buffer.from(part, 'base64url').toString('utf8')) as Record<string, unknown>;
}

function publicKey(key: string) {
	const point = Buffer.from(key, 'base64url');
	if (point.length !== POINT_BYTES) {
		throw new Error('The key of the sender is no point of the curve.');
	}
	const [x, y] = [point.subarray(1, 33), point.subarray(33)].map((part) => part.toString('base64url'));
	return createPublicKey({ key: { kty: 'EC', crv: 'P-256', x, y }, format: 'jwk' });
}
