import { error, redirect } from '@sveltejs/kit';
import { m } from '$lib/i18n/paraglide/messages';
import { env } from '$lib/server/env';
import type { RequestHandler } from './$types';

/** In a demonstration: the page of the stand-ins, with everybody's phone and the mailbox. */
export const GET: RequestHandler = () => {
	if (!env().demo) {
		error(404, { message: m.common_error_404_title() });
	}
	redirect(303, `http://127.0.0.1:${env().fakes.sms}/`);
};
