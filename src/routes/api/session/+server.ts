import { Problem } from '$lib/domain/core/errors';
import { signInBody } from '$lib/domain/accounts/forms';
import { signIn, signOut } from '$lib/server/accounts/sign-in';
import { readJson } from '$lib/server/http/body';
import { answering, jsonResponse } from '$lib/server/http/endpoint';
import { invalidBody } from '$lib/server/http/problem';
import type { RequestHandler } from './$types';

export const POST: RequestHandler = ({ request, locals, cookies }) =>
	answering(async () => {
		const parsed = signInBody.safeParse(await readJson(request));
		if (!parsed.success) {
			throw invalidBody(parsed.error);
		}
		return jsonResponse(200, { user: await signIn(locals.context, cookies, parsed.data) });
	});

export const DELETE: RequestHandler = ({ locals, cookies }) =>
	answering(async () => {
		if (!locals.context.actor) {
			throw new Problem('not-signed-in');
		}
		await signOut(locals.context, cookies);
		return new Response(null, { status: 204, headers: { 'clear-site-data': '"cache"' } });
	});
