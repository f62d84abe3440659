import { error, fail, redirect, type RequestEvent } from '@sveltejs/kit';
import { Problem } from '$lib/domain/core/errors';
import { routes } from '$lib/routes';
import { phonePage } from '$lib/server/escalations/phone';
import { takeByLink } from '$lib/server/escalations/take';
import { orErrorPage } from '$lib/server/http/page';
import type { Actions, PageServerLoad } from './$types';

/** Looking takes nothing: previews of messages, virus scanners and curious thumbs only read. */
export const load: PageServerLoad = ({ locals, params }) =>
	orErrorPage(() => phonePage(locals.context, params.token));

export const actions: Actions = {
	/** Take it, for the person whom the link was sent to. Sent twice it is taken once. */
	default: async ({ locals, params }) => {
		try {
			await takeByLink(locals.context, params.token);
		} catch (thrown) {
			return refused(thrown, locals, params.token);
		}
		redirect(303, routes.phoneLink(params.token));
	}
};

/** Somebody was faster, or the link opens nothing any more. The page that comes back says who has it. */
async function refused(thrown: unknown, locals: RequestEvent['locals'], token: string) {
	if (!(thrown instanceof Problem)) {
		throw thrown;
	}
	const { escalation } = await orErrorPage(() => phonePage(locals.context, token));
	if (escalation.mine) {
		redirect(303, routes.phoneLink(token));
	}
	if (thrown.status !== 409) {
		error(thrown.status, { message: thrown.detail, code: thrown.code });
	}
	return fail(thrown.status, { refused: thrown.code });
}
