import { error, redirect, type Handle, type HandleServerError, type ServerInit } from '@sveltejs/kit';
import { sequence } from '@sveltejs/kit/hooks';
import { SIGN_IN_FIELDS } from '$lib/domain/accounts/kept';
import { Problem } from '$lib/domain/core/errors';
import { m } from '$lib/i18n/paraglide/messages';
import { baseLocale } from '$lib/i18n/paraglide/runtime';
import { paraglideMiddleware } from '$lib/i18n/paraglide/server';
import { routes } from '$lib/routes';
import { personOfToken } from '$lib/server/auth/people';
import { personOfCookie, signInStillGood } from '$lib/server/auth/sign-ins';
import { now } from '$lib/server/clock';
import { linkExists } from '$lib/server/escalations/link';
import { newId } from '$lib/server/ids';
import { liveCursor } from '$lib/server/live/log';
import { log } from '$lib/server/log';
import { pageExists } from '$lib/server/patient-page/link';
import { clientAddress } from '$lib/server/http/address';
import { compressed } from '$lib/server/http/compress';
import { secureHeaders } from '$lib/server/http/headers';
import { countedFor, countRequest, linkTokenIn, pageTokenIn } from '$lib/server/http/limits';
import { refuseForeignOrigin } from '$lib/server/http/origin';
import { problemResponse } from '$lib/server/http/problem';
import { Turnstile } from '$lib/server/http/turnstile';
import { startServer } from '$lib/server/start';

/** Runs once, before the first request is answered. */
export const init: ServerInit = () => startServer();

/** All requests go through it before they ask the database anything. */
const turnstile = new Turnstile();

const identify: Handle = async ({ event, resolve }) => {
	const { cookies, request } = event;
	// Read first: a connection that is gone after an await has no address any more.
	const address = clientAddress(event);
	await turnstile.pass();
	const bearer = /^Bearer (\S+)$/.exec(request.headers.get('authorization') ?? '')?.[1];
	const cookie = bearer ? null : await personOfCookie(cookies);
	const person = bearer ? await personOfToken(bearer) : (cookie?.person ?? null);
	event.locals.requestId = newId();
	event.locals.signInId = cookie?.signInId ?? null;
	event.locals.credentialStillGood = async () =>
		bearer
			? (await personOfToken(bearer)) !== null
			: cookie !== null && signInStillGood(cookie.signInId, now());
	event.locals.context = { actor: person, now: now(), address, key: null };
	const { pathname } = event.url;
	const [link, page] = [await knownLink(pathname), await knownPage(pathname)];
	const counted =
		page === null
			? countedFor({ method: request.method, pathname }, person?.id ?? null, address, link)
			: `page:${page}`;
	if (counted !== null) {
		countRequest(counted, now());
	}
	refuseForeignOrigin(event, bearer !== undefined);
	return resolve(event);
};

/** The token of a link that exists, also of one that has expired; null for any other address. */
async function knownLink(pathname: string): Promise<string | null> {
	const token = linkTokenIn(pathname);
	return token !== null && (await linkExists(token)) ? token : null;
}

/** The token of a link to a patient's page that exists, also of one that has ended; null for any other address. */
async function knownPage(pathname: string): Promise<string | null> {
	const token = pageTokenIn(pathname);
	return token !== null && (await pageExists(token)) ? token : null;
}

/**
 * Pages behind the sign-in send others to it; the API answers 401 by itself, and so does a form, which keeps what was
 * typed: see `formAction()`.
 */
const guard: Handle = async ({ event, resolve }) => {
	const inside = event.route.id?.startsWith('/(app)') ?? false;
	const reads = event.request.method === 'GET' || event.request.method === 'HEAD';
	if (inside && reads && event.locals.context.actor?.kind !== 'person') {
		redirect(303, routes.signIn(event.url.pathname + event.url.search));
	}
	// Taken before the page reads anything: what happens from here on comes by the stream.
	event.locals.liveCursor = inside ? await liveCursor() : 0;
	return resolve(event);
};

/**
 * A form that came without script and found nobody signed in is answered by the page that keeps it and signs in. It
 * is a page of its own, because what the page of errors shows every other page would load as well.
 */
const keep: Handle = async ({ event, resolve }) => {
	const response = await resolve(event);
	const { kept } = event.locals;
	return kept
		? event.fetch(routes.signInAndSend(), {
				method: 'POST',
				headers: { accept: 'text/html' },
				body: new URLSearchParams([
					...kept.fields.map(([name, value]) => [name, value]),
					[SIGN_IN_FIELDS.to, kept.to]
				])
			})
		: response;
};

/** What the API does not know is a problem too, not a page. */
const problems: Handle = async ({ event, resolve }) => {
	const api = event.url.pathname.startsWith('/api/');
	try {
		const response = await resolve(event);
		if (api && response.status === 405) {
			return noSuchMethod(event.request.method, response);
		}
		if (api && event.route.id === null) {
			return problemResponse(new Problem('not-found', `There is no ${event.url.pathname}.`));
		}
		return response;
	} catch (thrown) {
		if (!(thrown instanceof Problem)) {
			throw thrown;
		}
		if (api || event.request.method !== 'GET') {
			return problemResponse(thrown);
		}
		error(thrown.status, { message: thrown.detail, code: thrown.code });
	}
};

/** RFC 9110, 15.5.6: the answer says which methods there are. */
function noSuchMethod(method: string, { headers }: Response): Response {
	const response = problemResponse(new Problem('no-such-method', `${method} is not known here.`));
	response.headers.set('allow', headers.get('allow') ?? '');
	return response;
}

const harden: Handle = async ({ event, resolve }) =>
	compressed(event.request, secureHeaders(await resolve(event), event.url.pathname));

/**
 * A page is read in the language that its reader chose. What a write puts on record is not: a thread has one
 * language, that of the hospital, whoever writes into it.
 */
const language: Handle = ({ event, resolve }) => {
	const spoken = (lang: string) =>
		resolve(event, {
			transformPageChunk: ({ html }) => html.replace('%lang%', event.locals.language ?? lang)
		});
	const isPage = event.request.method === 'GET' && !event.url.pathname.startsWith('/api/');
	return isPage ? paraglideMiddleware(event.request, ({ locale }) => spoken(locale)) : spoken(baseLocale);
};

/** The language comes last: it waits, and who calls from where must be read before anything waits. */
export const handle = sequence(harden, problems, identify, guard, keep, language);

/** Expected errors keep their text; anything else is logged under an id and answered without detail. */
export const handleError: HandleServerError = ({ error: thrown, event, status, message }) => {
	if (thrown instanceof Problem) {
		return { message: thrown.detail, code: thrown.code };
	}
	if (status === 404) {
		return { message };
	}
	const id = event.locals.requestId ?? newId();
	log().error({ id, route: event.route.id, err: thrown }, 'request failed');
	return { message: m.common_error_ours(), id };
};
