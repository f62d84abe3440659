import { error, type RequestEvent } from '@sveltejs/kit';
import { Problem } from '$lib/domain/core/errors';
import { requirePerson, type Context, type PersonContext } from '../context';
import { digestOf } from '../idempotency';
import { newId } from '../ids';

/** What a load and an action have in common with any other request. */
export type PageEvent = Pick<RequestEvent, 'locals' | 'url' | 'request'>;

const KEY_PATTERN = /^[\x21-\x7e]{1,200}$/;

/**
 * What a page shows to the person who is signed in. A problem becomes the error page with its status and code.
 *
 *     export const load: PageServerLoad = (event) =>
 *       pageLoad(event, (context) => read.nameboard(context, event.params.id));
 */
export function pageLoad<T>(
	event: Pick<PageEvent, 'locals'>,
	work: (context: PersonContext) => Promise<T>
): Promise<T> {
	return orErrorPage(async () => work(requirePerson(event.locals.context)));
}

/** The same for pages that need no sign-in. What is no problem is a bug, and goes on to `handleError`. */
export async function orErrorPage<T>(work: () => Promise<T>): Promise<T> {
	try {
		return await work();
	} catch (thrown) {
		if (thrown instanceof Problem) {
			error(thrown.status, { message: thrown.detail, code: thrown.code });
		}
		throw thrown;
	}
}

/** A key for the hidden field of a form. Give each form of a page one, made in `load`. */
export function newFormKey(): string {
	return newId();
}

/**
 * The context of a form action, with the hidden key of the form: the same form sent twice is done once. Leave
 * secrets out of `data`; a digest of a password would be a password to guess at.
 * @param data what the digest is made of: the posted fields
 * @throws Problem `malformed` for a key that is none
 */
export function withFormKey<C extends Context>(context: C, event: PageEvent, key: string, data: unknown): C {
	if (!KEY_PATTERN.test(key)) {
		throw new Problem('malformed', 'The key of the form has 1 to 200 visible ASCII characters.');
	}
	return { ...context, key: { key, path: pathOfAction(event.url), digest: digestOf(data) } };
}

/** The page and the name of its action: `/account?/change-password`. Other parameters do not make another form. */
function pathOfAction({ pathname, searchParams }: URL): string {
	const action = [...searchParams.keys()].find((name) => name.startsWith('/'));
	return action ? `${pathname}?${action}` : pathname;
}
