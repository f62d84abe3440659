import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { resendForm } from '$lib/domain/messages/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { idParam } from '$lib/server/http/param';
import { resendMessage } from '$lib/server/messages/resend';
import { getStory } from '$lib/server/messages/story';
import type { Actions, PageServerLoad } from './$types';

/** One message from its cause to its end. */
export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => ({
		story: await getStory(context, event.params.id),
		resend: await superValidate(zod4(resendForm)),
		key: newFormKey()
	}));

export const actions: Actions = {
	resend: formAction({
		schema: resendForm,
		async run(context, fields, event) {
			await resendMessage(context, idParam(event), fields);
			return m.log_resend_done();
		}
	})
};
