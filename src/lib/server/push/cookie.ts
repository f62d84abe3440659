import type { Cookies } from '@sveltejs/kit';
import { HOUR } from '$lib/domain/core/time';
import { digestSecret } from '../auth/lucia';
import { env } from '../env';
import { newSecret } from '../ids';

/**
 * By what a browser is known again whose notices are on. It lets nobody in: a sign-in ends with the shift, and whose
 * notices a browser shows has to be known also when the next person signs in there.
 */
const LIFE_MS = 400 * 24 * HOUR;

function nameOf(): string {
	return env().secure ? '__Host-ropewalk-device' : 'ropewalk-device';
}

function options() {
	return { path: '/', httpOnly: true, sameSite: 'lax', secure: env().secure } as const;
}

/** The digest that stands with the device; null for a browser without one. */
export function deviceIn(cookies: Cookies): string | null {
	const token = cookies.get(nameOf());
	return token ? digestSecret(token) : null;
}

/** Mark this browser anew. @returns the digest to keep */
export function markDevice(cookies: Cookies): string {
	const token = newSecret();
	cookies.set(nameOf(), token, { ...options(), maxAge: LIFE_MS / 1000 });
	return digestSecret(token);
}

export function unmarkDevice(cookies: Cookies): void {
	cookies.delete(nameOf(), options());
}
