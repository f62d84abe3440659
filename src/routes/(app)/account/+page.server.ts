import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { changePasswordForm, createTokenBody, idForm, PASSWORD_MIN } from '$lib/domain/accounts/forms';
import { emptyBody } from '$lib/domain/escalations/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { meOf } from '$lib/server/accounts/me';
import { changePassword, makeToken, revokeToken, tokensOf } from '$lib/server/accounts/own';
import { formAction } from '$lib/server/http/form-action';
import { addStandInDevice, reachOf } from '$lib/server/push/reach';
import { removeDevice, tryDevice } from '$lib/server/push/devices';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const [me, tokens, reach] = await Promise.all([
			meOf(context.actor),
			tokensOf(context),
			reachOf(context, event.cookies)
		]);
		return {
			me: me.user,
			tokens,
			reach,
			deviceKey: newFormKey(),
			password: await superValidate<{ current: string; next: string }, string>(zod4(changePasswordForm), {
				id: 'password'
			}),
			token: await superValidate<{ name: string }, string>(zod4(createTokenBody), { id: 'token' }),
			passwordMin: PASSWORD_MIN,
			passwordKey: newFormKey(),
			tokenKey: newFormKey()
		};
	});

export const actions: Actions = {
	password: formAction({
		id: 'password',
		schema: changePasswordForm,
		secrets: ['current', 'next'],
		words: {
			'too-many': ({ extra }) => m.account_sign_in_wait({ seconds: extra.retryAfterSeconds ?? 1 })
		},
		async run(context, fields, { locals }) {
			await changePassword(context, locals.signInId, fields);
			return m.account_password_changed();
		}
	}),
	/** The token goes back beside the form: it is shown this once, and nothing keeps it. */
	token: async (event) => {
		let made: string | null = null;
		const answer = await formAction({
			id: 'token',
			schema: createTokenBody,
			async run(context, fields) {
				made = await makeToken(context, fields);
				return made === null ? m.account_token_made_before() : m.account_token_made({ name: fields.name });
			}
		})(event);
		return 'form' in answer ? { ...answer, made: made as string | null } : answer;
	},
	/** Of a demonstration alone. */
	standIn: formAction({
		id: 'standIn',
		schema: emptyBody,
		async run(context) {
			await addStandInDevice(context);
			return m.account_device_stand_in_added();
		}
	}),
	try: formAction({
		id: 'device',
		schema: idForm,
		async run(context, { id }) {
			await tryDevice(context, id);
			return m.account_device_tried();
		}
	}),
	forget: formAction({
		id: 'device',
		schema: idForm,
		async run(context, { id }) {
			await removeDevice(context, id);
			return m.account_device_forgotten();
		}
	}),
	revoke: formAction({
		id: 'revoke',
		schema: idForm,
		async run(context, { id }) {
			await revokeToken(context, id);
			return m.account_token_revoked();
		}
	})
};
