import { createDecipheriv, hkdfSync } from 'node:crypto';
import type { Device } from './state';

const SALT_BYTES = 16;
const TAG_BYTES = 16;
/** Salt, record size, length of the key that follows. */
const HEADER_BYTES = SALT_BYTES + 4 + 1;
/** The mark at the end of the last record's text. */
const LAST = 2;

/**
 * What was encrypted for a device, by RFC 8291 over one record of RFC 8188. It is written from the two documents and
 * not with the library that encrypts, so that the two check each other.
 * @throws Error when it was not encrypted for this device
 */
export function decrypt({ keys, auth }: Pick<Device, 'keys' | 'auth'>, body: Buffer): string {
	const salt = body.subarray(0, SALT_BYTES);
	const end = HEADER_BYTES + (body[HEADER_BYTES - 1] ?? 0);
	const senderKey = body.subarray(HEADER_BYTES, end);
	const shared = keys.computeSecret(senderKey);
	const info = Buffer.concat([Buffer.from('WebPush: info\0'), keys.getPublicKey(), senderKey]);
	const secret = derive(shared, auth, info, 32);
	const key = derive(secret, salt, Buffer.from('Content-Encoding: aes128gcm\0'), 16);
	const nonce = derive(secret, salt, Buffer.from('Content-Encoding: nonce\0'), 12);
	const record = body.subarray(end);
	const decipher = createDecipheriv('aes-128-gcm', key, nonce);
	decipher.setAuthTag(record.subarray(-TAG_BYTES));
	const text = Buffer.concat([decipher.update(record.subarray(0, -TAG_BYTES)), decipher.final()]);
	const mark = text.lastIndexOf(LAST);
	if (mark < 0 || text.subarray(mark + 1).some((byte) => byte !== 0)) {
		throw new Error('The record does not end as the last one.');
	}
	return text.subarray(0, mark).toString('utf8');
}

function derive(secret: Buffer, salt: Buffer, info: Buffer, bytes: number): Buffer {
	return Buffer.from(hkdfSync('sha256', secret, salt, info, bytes));
}
