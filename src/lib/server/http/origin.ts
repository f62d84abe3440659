import type { RequestEvent } from '@sveltejs/kit';
import { Problem } from '$lib/domain/core/errors';
import { cookieName } from '../auth/sign-ins';
import { env } from '../env';
import { pageTokenIn } from './limits';

const READS = new Set(['GET', 'HEAD', 'OPTIONS']);

/** Signed by the gateway, which sends no Origin; their handlers check the signature. */
const SIGNED = new Set([
	'/api/hooks/sms',
	'/api/hooks/sms-status',
	'/api/hooks/voice',
	'/api/hooks/voice-status'
]);

/** Moves the demonstration's clock, for test tools without a browser; see its handler. */
const OPEN = new Set(['/api/demo/clock']);

/**
 * Every write must come from a page of our own, whatever its content type. Kit's own check looks at form content
 * types only and refuses the gateway's posts. Programs with a personal token carry no cookie and need no Origin.
 * @throws Problem `foreign-origin`
 */
export function refuseForeignOrigin(event: RequestEvent, usesBearer: boolean): void {
	const { request, url } = event;
	if (READS.has(request.method) || SIGNED.has(url.pathname) || OPEN.has(url.pathname) || usesBearer) {
		return;
	}
	const origin = request.headers.get('origin');
	if (origin !== null && ownOrigins().has(origin)) {
		return;
	}
	// A patient's page sends no referrer, and browsers then do not say where its forms come from. Whoever posts there
	// has to know the address, which is the secret; a cookie gives no more rights there.
	if (origin === 'null' && pageTokenIn(url.pathname) !== null) {
		return;
	}
	// Browsers name the origin of every write. Without one, and without our cookie, it is a program that is nobody yet.
	if (origin === null && event.cookies.get(cookieName()) === undefined) {
		return;
	}
	throw new Problem('foreign-origin', `The origin ${origin ?? '(none)'} is not ${env().publicUrl}.`);
}

function ownOrigins(): Set<string> {
	const own = new URL(env().publicUrl).origin;
	// A demonstration is opened by either name of this machine.
	return env().demo
		? new Set([own, `http://localhost:${env().port}`, `http://127.0.0.1:${env().port}`])
		: new Set([own]);
}
