import { error, redirect } from '@sveltejs/kit';
import { m } from '$lib/i18n/paraglide/messages';
import { routes } from '$lib/routes';
import { env } from '$lib/server/env';
import type { RequestHandler } from './$types';

/** The sign-ins of the demonstration have one place, on the front page. */
export const GET: RequestHandler = () => {
	if (!env().demo) {
		error(404, { message: m.common_error_404_title() });
	}
	redirect(303, `${routes.front()}#demonstration`);
};
