import { redirect } from '@sveltejs/kit';
import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { signInBody } from '$lib/domain/accounts/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { safeNext } from '$lib/routes';
import { signIn } from '$lib/server/accounts/sign-in';
import { env } from '$lib/server/env';
import { openFormAction } from '$lib/server/http/form-action';
import { newFormKey } from '$lib/server/http/page';
import { DEMO_PASSWORD, emailOf, SHOWN } from '$lib/server/setup/demonstration/people';
import type { Actions, PageServerLoad } from './$types';

const schema = signInBody.pick({ email: true, password: true });

export const load: PageServerLoad = async ({ locals, url }) => {
	const next = url.searchParams.get('next');
	if (locals.context.actor?.kind === 'person') {
		redirect(303, safeNext(next));
	}
	return {
		form: await superValidate<{ email: string; password: string }, string>(shown(url), zod4(schema)),
		key: newFormKey(),
		/** Whether somebody was on the way to a page of ours. */
		onward: next !== null && safeNext(next) === next,
		demo: env().demo
	};
};

/** One of the people whom a demonstration shows, chosen on the front page; nobody's password is filled in elsewhere. */
function shown(url: URL) {
	const email = SHOWN.map(emailOf).find((one) => one === url.searchParams.get('as'));
	return env().demo && email ? { email, password: DEMO_PASSWORD } : undefined;
}

/**
 * Signing in. The form's key is not used: a sign-in is nothing to be done once, and no trace of a password is
 * kept, not even a digest.
 */
export const actions: Actions = {
	default: openFormAction({
		schema,
		secrets: ['password'],
		words: {
			'sign-in-failed': () => m.account_sign_in_failed(),
			'too-many': ({ extra }) => m.account_sign_in_wait({ seconds: extra.retryAfterSeconds ?? 1 })
		},
		async run(context, { email, password }, { cookies, url }) {
			await signIn(context, cookies, { email, password });
			redirect(303, safeNext(url.searchParams.get('next')));
		}
	})
};
