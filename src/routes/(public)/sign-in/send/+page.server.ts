import { error, fail, redirect, type RequestEvent } from '@sveltejs/kit';
import { keptForm, SIGN_IN_FIELDS } from '$lib/domain/accounts/kept';
import { signInBody } from '$lib/domain/accounts/forms';
import { Problem } from '$lib/domain/core/errors';
import { m } from '$lib/i18n/paraglide/messages';
import { routes, safeNext } from '$lib/routes';
import { signIn } from '$lib/server/accounts/sign-in';
import type { Actions, PageServerLoad } from './$types';

/** Only who has no script comes here: a script keeps what was typed where it was typed. */
export const csr = false;

/** There is only something to send with a POST; who comes back here later signs in as usual. */
export const load: PageServerLoad = ({ request }) => {
	if (request.method !== 'POST') {
		redirect(303, routes.signIn());
	}
};

export const actions: Actions = {
	/**
	 * Sign in, and send the kept form to where it was going. 307 keeps method and body: the browser itself posts the
	 * very same fields again, with their key and the new cookie, and the page's own action answers.
	 */
	default: async (event) => {
		const posted = await event.request.formData();
		const to = textOf(posted, SIGN_IN_FIELDS.to);
		if (to === '' || safeNext(to, '') !== to) {
			error(400, { message: 'The form was going to no page of ours.', code: 'malformed' });
		}
		if (!posted.has(SIGN_IN_FIELDS.email)) {
			// The form itself, as the hooks hand it over: nobody has tried to sign in yet.
			return fail(401, {
				kept: keptForm(to, posted, Object.values(SIGN_IN_FIELDS)),
				email: '',
				refused: null
			});
		}
		const refused = await refusalOf(event, posted);
		if (refused !== null) {
			const email = textOf(posted, SIGN_IN_FIELDS.email);
			return fail(refused.status, {
				kept: keptForm(to, posted, Object.values(SIGN_IN_FIELDS)),
				email,
				refused: refused.words
			});
		}
		redirect(307, to);
	}
};

/** Sign in; what stands in the way, in words, or null. */
async function refusalOf(
	{ locals, cookies }: RequestEvent,
	posted: FormData
): Promise<{ status: number; words: string } | null> {
	const parsed = signInBody.pick({ email: true, password: true }).safeParse({
		email: textOf(posted, SIGN_IN_FIELDS.email),
		password: textOf(posted, SIGN_IN_FIELDS.password)
	});
	if (!parsed.success) {
		return { status: 422, words: m.account_sign_in_failed() };
	}
	try {
		await signIn(locals.context, cookies, parsed.data);
		return null;
	} catch (thrown) {
		if (!(thrown instanceof Problem)) {
			throw thrown;
		}
		const { retryAfterSeconds } = thrown.extra;
		const words =
			retryAfterSeconds === undefined
				? m.account_sign_in_failed()
				: m.account_sign_in_wait({ seconds: retryAfterSeconds });
		return { status: thrown.status, words };
	}
}

function textOf(posted: FormData, name: string): string {
	const value = posted.get(name);
	return typeof value === 'string' ? value : '';
}
