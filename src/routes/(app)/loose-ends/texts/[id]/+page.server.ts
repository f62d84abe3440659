import { redirect } from '@sveltejs/kit';
import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { emptyBody } from '$lib/domain/escalations/forms';
import { routes } from '$lib/routes';
import { formAction } from '$lib/server/http/form-action';
import { idParam } from '$lib/server/http/param';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { settleInbound } from '$lib/server/messages/settle';
import { getInboundText } from '$lib/server/messages/to-see-to';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async ({ actor }) => ({
		text: await getInboundText(actor, idParam(event)),
		form: await superValidate(zod4(emptyBody)),
		key: newFormKey()
	}));

export const actions: Actions = {
	settle: formAction({
		schema: emptyBody,
		run: async (context, _fields, event) => {
			await settleInbound(context, idParam(event));
			redirect(303, routes.looseEnds());
		}
	})
};
