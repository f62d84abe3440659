import type { Cookies } from '@sveltejs/kit';
import { eq } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { now } from '../clock';
import { db, type Tx } from '../db';
import { signIns } from '../db/schema';
import { env } from '../env';
import { newSecret } from '../ids';
import { digestSecret, lucia, SIGN_IN_MS } from './lucia';
import { loadPerson } from './people';

/** Kit takes http for https behind a proxy, so the public address decides about Secure and the `__Host-` name. */
export function cookieName(): string {
	return env().secure ? '__Host-ropewalk' : 'ropewalk';
}

function cookieOptions() {
	return { path: '/', httpOnly: true, sameSite: 'lax', secure: env().secure } as const;
}

/**
 * Make a sign-in for an account. The cookie is set with {@link keepInBrowser} once the transaction stands.
 * @returns the token, of which the database keeps only a digest
 */
export async function startSignIn(tx: Tx, userId: string, at: number): Promise<string> {
	const token = newSecret();
	const expiresAt = Math.floor((at + SIGN_IN_MS) / 1000);
	await tx.insert(signIns).values({ id: digestSecret(token), userId, expiresAt, createdAt: at });
	return token;
}

/** Put the token of a sign-in into the browser's cookie. */
export function keepInBrowser(cookies: Cookies, token: string): void {
	cookies.set(cookieName(), token, { ...cookieOptions(), maxAge: SIGN_IN_MS / 1000 });
}

/** Take the cookie out of the browser, after its sign-in has ended. */
export function forgetInBrowser(cookies: Cookies): void {
	cookies.delete(cookieName(), cookieOptions());
}

/**
 * The person of the cookie, or null for no cookie, an unknown or ended sign-in, or a disabled account. Role and
 * units are read anew for every request, so that a change counts at once.
 */
export async function personOfCookie(cookies: Cookies): Promise<{ person: Person; signInId: string } | null> {
	const token = cookies.get(cookieName());
	if (!token) {
		return null;
	}
	const { session } = await lucia().validateSession(digestSecret(token));
	if (!session || session.createdAt + SIGN_IN_MS <= now()) {
		return null;
	}
	const person = await loadPerson(db(), session.userId);
	return person && { person, signInId: session.id };
}

/**
 * End the sign-in behind a browser's cookie, if there is one.
 * @returns the id of the account that was signed in, or null
 */
export async function endSignIn(tx: Tx, cookies: Cookies): Promise<string | null> {
	const token = cookies.get(cookieName());
	if (!token) {
		return null;
	}
	const ended = await tx
		.delete(signIns)
		.where(eq(signIns.id, digestSecret(token)))
		.returning({ userId: signIns.userId });
	return ended[0]?.userId ?? null;
}

/** Is the sign-in behind an open stream still good? Checked at each heartbeat. */
export async function signInStillGood(signInId: string, at: number): Promise<boolean> {
	const { session } = await lucia().validateSession(signInId);
	return session !== null && session.createdAt + SIGN_IN_MS > at;
}
