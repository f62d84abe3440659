import type { Cookies } from '@sveltejs/kit';
import { lt } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { now } from '../clock';
import { db } from '../db';
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

/** Make a sign-in for an account and put its token into the cookie. */
export async function startSignIn(cookies: Cookies, userId: string, at: number): Promise<void> {
	const token = newSecret();
	await lucia().createSession(userId, { createdAt: at }, { sessionId: digestSecret(token) });
	cookies.set(cookieName(), token, { ...cookieOptions(), maxAge: SIGN_IN_MS / 1000 });
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
	if (!session) {
		return null;
	}
	if (session.createdAt + SIGN_IN_MS <= now()) {
		await lucia().invalidateSession(session.id);
		return null;
	}
	const person = await loadPerson(db(), session.userId);
	return person && { person, signInId: session.id };
}

export async function endSignIn(cookies: Cookies): Promise<void> {
	const token = cookies.get(cookieName());
	if (token) {
		await lucia().invalidateSession(digestSecret(token));
	}
	cookies.delete(cookieName(), cookieOptions());
}

/** End every sign-in of an account: after disabling it, or after its password changed. */
export async function endAllSignIns(userId: string): Promise<void> {
	await lucia().invalidateUserSessions(userId);
}

/** Is the sign-in behind an open stream still good? Checked at each heartbeat. */
export async function signInStillGood(signInId: string, at: number): Promise<boolean> {
	const { session } = await lucia().validateSession(signInId);
	return session !== null && session.createdAt + SIGN_IN_MS > at;
}

export async function removeEndedSignIns(at: number): Promise<void> {
	await db()
		.delete(signIns)
		.where(lt(signIns.createdAt, at - SIGN_IN_MS));
}
