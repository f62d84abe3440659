import { createHash } from 'node:crypto';
import { DrizzleSQLiteAdapter } from '@lucia-auth/adapter-drizzle';
import { Lucia, TimeSpan } from 'lucia';
import { db, type Db } from '../db';
import { signIns, users } from '../db/schema';

declare module 'lucia' {
	interface Register {
		Lucia: Lucia<{ createdAt: number }>;
		DatabaseSessionAttributes: { createdAt: number };
	}
}

/** A sign-in lasts one shift, and never longer, however busy it is. */
export const SIGN_IN_HOURS = 12;
export const SIGN_IN_MS = SIGN_IN_HOURS * 60 * 60 * 1000;

let made: { lucia: Lucia<{ createdAt: number }>; on: Db } | null = null;

/** Looking at a sign-in that has ended does not remove it: `endSignInsOver()` does, and puts it on record. */
class KeepingAdapter extends DrizzleSQLiteAdapter {
	override deleteSession(): Promise<void> {
		return Promise.resolve();
	}
}

/** lucia over the database that is open now; only `auth/` knows that it is lucia. */
export function lucia(): Lucia<{ createdAt: number }> {
	if (made?.on !== db()) {
		const adapter = new KeepingAdapter(db(), signIns, users);
		made = {
			on: db(),
			lucia: new Lucia(adapter, {
				sessionExpiresIn: new TimeSpan(SIGN_IN_HOURS, 'h'),
				getSessionAttributes: (row) => ({ createdAt: row.createdAt })
			}) as Lucia<{ createdAt: number }>
		};
	}
	return made.lucia;
}

/** The database keeps this digest; the token itself is only in the cookie, the link or the program. */
export function digestSecret(secret: string): string {
	return createHash('sha256').update(secret).digest('hex');
}
