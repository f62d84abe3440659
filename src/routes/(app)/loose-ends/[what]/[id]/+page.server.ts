import { redirect } from '@sveltejs/kit';
import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { notFound } from '$lib/domain/core/errors';
import { emptyBody } from '$lib/domain/escalations/forms';
import { settleTextBody } from '$lib/domain/messages/forms';
import { routes } from '$lib/routes';
import { formAction } from '$lib/server/http/form-action';
import { idParam } from '$lib/server/http/param';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { settleInbound, settleMessage } from '$lib/server/messages/settle';
import { getFailedMessage, getInboundText } from '$lib/server/messages/to-see-to';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async ({ actor }) => {
		const what = whatOf(event.params);
		const id = idParam(event);
		return {
			seeTo:
				what === 'messages'
					? { what, item: await getFailedMessage(actor, id) }
					: { what, item: await getInboundText(actor, id) },
			messageForm: await superValidate(zod4(emptyBody)),
			textForm: await superValidate(zod4(settleTextBody)),
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
	text: formAction({
		schema: settleTextBody,
		run: async (context, fields, event) => {
			await settleInbound(context, idParam(event), fields);
			redirect(303, routes.looseEnds());
		}
	})
};

/** The two things that a text could not do and a person has to; any other address leads nowhere. */
function whatOf({ what }: { what?: string }): 'messages' | 'texts' {
	if (what !== 'messages' && what !== 'texts') {
		throw notFound('page');
	}
	return what;
}
