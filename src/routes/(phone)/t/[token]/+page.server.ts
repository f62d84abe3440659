import { error, fail, redirect, type RequestEvent } from '@sveltejs/kit';
import { Problem } from '$lib/domain/core/errors';
import { LINK_DEEDS, linkDeed, type LinkDeed } from '$lib/domain/escalations/forms';
import { routes } from '$lib/routes';
import type { Context } from '$lib/server/context';
import {
	arriveByLink,
	confirmByLink,
	giveEtaByLink,
	takeByLink,
	untakeByLink
} from '$lib/server/escalations/link';
import { phonePage } from '$lib/server/escalations/phone';
import { newFormKey, orErrorPage, withFormKey } from '$lib/server/http/page';
import type { Actions, PageServerLoad } from './$types';

/** Looking takes nothing: previews of messages, virus scanners and curious thumbs only read. */
export const load: PageServerLoad = ({ locals, params }) =>
	orErrorPage(async () => ({
		...(await phonePage(locals.context, params.token)),
		keys: Object.fromEntries(LINK_DEEDS.map((deed) => [deed, newFormKey()])) as Record<
			LinkDeed['deed'],
			string
		>
	}));

export const actions: Actions = {
	/** Take it, or what comes after it, for the person whom the link was sent to. Sent twice it is done once. */
	default: async (event) => {
		const { locals, params, request } = event;
		const posted = await request.formData();
		const deed = linkDeed.safeParse(Object.fromEntries(posted));
		if (!deed.success) {
			return fail(422, { refused: 'invalid' });
		}
		try {
			const key = posted.get('key');
			const context =
				typeof key === 'string' && key ? withFormKey(locals.context, event, key, deed.data) : locals.context;
			await perform(context, params.token, deed.data);
		} catch (thrown) {
			return refused(thrown, locals, params.token, deed.data);
		}
		redirect(303, routes.phoneLink(params.token));
	}
};

function perform(context: Context, token: string, input: LinkDeed): Promise<unknown> {
	switch (input.deed) {
		case 'take':
			return takeByLink(context, token);
		case 'untake':
			return untakeByLink(context, token);
		case 'eta':
			return giveEtaByLink(context, token, input.etaMinutes);
		case 'arrive':
			return arriveByLink(context, token);
		case 'confirm':
			return confirmByLink(context, token);
	}
}

/** Somebody was faster, or the link opens nothing any more. The page that comes back says who has it. */
async function refused(thrown: unknown, locals: RequestEvent['locals'], token: string, { deed }: LinkDeed) {
	if (!(thrown instanceof Problem)) {
		throw thrown;
	}
	const { escalation } = await orErrorPage(() => phonePage(locals.context, token));
	const there = deed === 'arrive' && escalation.arrivedAt !== null;
	const done = escalation.mine && (deed === 'take' || deed === 'confirm' || there);
	// The first of two presses is still on its way: the page that comes back says what became of it.
	if (done || thrown.code === 'in-flight') {
		redirect(303, routes.phoneLink(token));
	}
	if (thrown.status === 404) {
		error(thrown.status, { message: thrown.detail, code: thrown.code });
	}
	return fail(thrown.status, { refused: thrown.code });
}
