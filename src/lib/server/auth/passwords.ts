import { hash, verify } from '@node-rs/argon2';

/** argon2id with the library's defaults fixed here, so that an upgrade does not change them unseen. */
const PARAMETERS = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

/** Hash a password (argon2id). NFKC first, so that the same characters typed on another keyboard fit. */
export function hashPassword(password: string): Promise<string> {
	return hash(password.normalize('NFKC'), PARAMETERS);
}

let dummy: Promise<string> | null = null;

/**
 * Check a password. Without a stored hash the same work is done against a made-up one, so that the time taken
 * does not tell whether the account exists.
 */
export async function passwordFits(stored: string | null, password: string): Promise<boolean> {
	dummy ??= hashPassword('an account that nobody has');
	const fits = await verify(stored ?? (await dummy), password.normalize('NFKC'));
	return fits && stored !== null;
}
