import { redirect } from '@sveltejs/kit';
import { routes } from '$lib/routes';
import { signOut } from '$lib/server/accounts/sign-in';
import type { RequestHandler } from './$types';

/** The button of the shell, with or without script. Only by POST: a link to it must sign nobody out. */
export const POST: RequestHandler = async ({ locals, cookies, setHeaders }) => {
	await signOut(locals.context, cookies);
	setHeaders({ 'clear-site-data': '"cache"' });
	redirect(303, routes.front());
};
