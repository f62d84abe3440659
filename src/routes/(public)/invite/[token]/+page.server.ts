import { redirect } from '@sveltejs/kit';
import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { firstAdminBody, invitedBody, PASSWORD_MIN } from '$lib/domain/accounts/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { routes } from '$lib/routes';
import { becomeFirstAdmin, lookAtInvitation, takeUpInvitation } from '$lib/server/accounts/invitations';
import { enterAs } from '$lib/server/accounts/sign-in';
import { openFormAction } from '$lib/server/http/form-action';
import { newFormKey } from '$lib/server/http/page';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ params, locals }) => ({
	invitation: await lookAtInvitation(params.token, locals.context.now),
	become: await superValidate<{ name: string; email: string; password: string }, string>(
		zod4(firstAdminBody),
		{ id: 'become' }
	),
	choose: await superValidate<{ password: string }, string>(zod4(invitedBody), { id: 'choose' }),
	passwordMin: PASSWORD_MIN,
	key: newFormKey()
});

const words = { 'not-found': () => m.account_invite_works_no_more() };

/** Both use the link up and sign in; it works once, so the form's key is not needed. */
export const actions: Actions = {
	become: openFormAction({
		id: 'become',
		schema: firstAdminBody,
		secrets: ['password'],
		words,
		async run(context, input, event) {
			const userId = await becomeFirstAdmin(context, event.params.token ?? '', input);
			await enterAs(context, event.cookies, userId);
			redirect(303, routes.adminAccounts());
		}
	}),
	choose: openFormAction({
		id: 'choose',
		schema: invitedBody,
		secrets: ['password'],
		words,
		async run(context, { password }, event) {
			const userId = await takeUpInvitation(context, event.params.token ?? '', password);
			await enterAs(context, event.cookies, userId);
			redirect(303, routes.looseEnds());
		}
	})
};
