import { createHash, createHmac, randomBytes } from 'node:crypto';
import { readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { routes } from '$lib/routes';
import { env } from './env';

/**
 * The secret part of a link that is sent by SMS. It is derived from the link's identifier with a key that is kept
 * outside the database, so that nothing in the database opens a link, and a message that is sent again carries
 * the same one.
 */
const TOKEN_CHARACTERS = 22;
const KEY_BYTES = 32;

let key: Buffer | null = null;

/** The token of a link: 22 characters of base64url, 132 bits of HMAC-SHA256 over its identifier. */
export function linkToken(linkId: string): string {
	key ??= linkKey();
	return createHmac('sha256', key).update(linkId).digest('base64url').slice(0, TOKEN_CHARACTERS);
}

/**
 * A text around a secret link, with `{link}` where it is filled in at the moment of sending. It is written with a
 * stand-in as long as the link, so that it is measured and cut as it will be read.
 */
export function aroundLink(write: (link: string) => string): string {
	const standIn = env().publicUrl + routes.phoneLink('x'.repeat(TOKEN_CHARACTERS));
	return write(standIn).replace(standIn, '{link}');
}

/** What is stored of a token and looked up when somebody comes with one: its SHA-256, in hexadecimal. */
export function linkDigest(token: string): string {
	return createHash('sha256').update(token).digest('hex');
}

/**
 * The configured secret, or the one in the data folder, which the first start makes. Losing it ends the links that
 * are on their way; people then sign in instead.
 */
function linkKey(): Buffer {
	const { linkSecret, dataDir } = env();
	if (linkSecret !== null) {
		return Buffer.from(linkSecret, 'utf8');
	}
	const file = path.join(dataDir, 'link.key');
	return readKey(file) ?? makeKey(file);
}

/** @throws Error when the file is there but is no key: an empty key would make every link guessable. */
function readKey(file: string): Buffer | null {
	let kept: Buffer;
	try {
		kept = readFileSync(file);
	} catch (error) {
		if ((error as NodeJS.ErrnoException).code === 'ENOENT') {
			return null;
		}
		throw error;
	}
	if (kept.length !== KEY_BYTES) {
		throw new Error(
			`${file} has ${kept.length} bytes, not ${KEY_BYTES}: restore it, or remove it to make a new one.`
		);
	}
	return kept;
}

/** One process owns the data folder, so nobody else makes a key meanwhile; the flag turns a bug into an error. */
function makeKey(file: string): Buffer {
	const made = randomBytes(KEY_BYTES);
	writeFileSync(file, made, { flag: 'wx', mode: 0o600 });
	return made;
}
