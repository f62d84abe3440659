import { redirect } from '@sveltejs/kit';
import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import type { Person } from '$lib/domain/access/actor';
import { notFound } from '$lib/domain/core/errors';
import { emptyBody } from '$lib/domain/escalations/forms';
import { settleTextForm } from '$lib/domain/messages/forms';
import { routes } from '$lib/routes';
import { formAction } from '$lib/server/http/form-action';
import { idParam } from '$lib/server/http/param';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { settleInbound, settleMessage } from '$lib/server/messages/settle';
import { getFailedMessage, getInboundText } from '$lib/server/messages/to-see-to';
import { getUntoldVisit, tellInPerson } from '$lib/server/visits/tell-in-person';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async ({ actor, now }) => {
		return {
			seeTo: await seeToOf(actor, whatOf(event.params), idParam(event), now),
			messageForm: await superValidate(zod4(emptyBody)),
			textForm: await superValidate(zod4(settleTextForm)),
			key: newFormKey()
		};
	});

export const actions: Actions = {
	message: formAction({
		schema: emptyBody,
		run: async (context, _fields, event) => {
			await settleMessage(context, idParam(event));
			redirect(303, routes.looseEnds());
		}
	}),
	visit: formAction({
		schema: emptyBody,
		run: async (context, _fields, event) => {
			await tellInPerson(context, idParam(event));
			redirect(303, routes.looseEnds());
		}
	}),
	text: formAction({
		schema: settleTextForm,
		run: async (context, fields, event) => {
			await settleInbound(context, idParam(event), fields);
			redirect(303, routes.looseEnds());
		}
	})
};

const WHATS = ['messages', 'texts', 'visits'] as const;

/** What a text could not do and a person has to; any other address leads nowhere. */
function whatOf({ what }: { what?: string }): (typeof WHATS)[number] {
	const known = WHATS.find((one) => one === what);
	if (!known) {
		throw notFound('page');
	}
	return known;
}

async function seeToOf(actor: Person, what: (typeof WHATS)[number], id: string, now: number) {
	switch (what) {
		case 'messages':
			return { what, item: await getFailedMessage(actor, id) };
		case 'texts':
			return { what, item: await getInboundText(actor, id) };
		case 'visits':
			return { what, item: await getUntoldVisit(actor, id, now) };
	}
}
