import { redirect } from '@sveltejs/kit';
import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { can } from '$lib/domain/access/can';
import { Problem } from '$lib/domain/core/errors';
import { referForm } from '$lib/domain/referrals/forms';
import { routes } from '$lib/routes';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { idParam } from '$lib/server/http/param';
import { refer } from '$lib/server/referrals/actions';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async ({ actor }) => {
		if (!can(actor, 'referral.create')) {
			throw new Problem('not-allowed', `The role ${actor.role} does not refer.`);
		}
		return { form: await superValidate(zod4(referForm)), key: newFormKey() };
	});

export const actions: Actions = {
	default: formAction({
		schema: referForm,
		run: async (context, fields, event) => {
			const episodeId = idParam(event);
			const { result } = await refer(context, episodeId, fields);
			redirect(303, routes.thread(episodeId, result.threadId));
		}
	})
};
