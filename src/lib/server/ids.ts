import { randomBytes } from 'node:crypto';
import { v7 } from 'uuid';

/** A new UUIDv7: opaque to clients, sorted by time of making in the database. */
export function newId(): string {
	return v7();
}

/** A secret of at least 128 bits for cookies, links and invitations, safe in a URL. */
export function newSecret(bytes = 32): string {
	return randomBytes(bytes).toString('base64url');
}
