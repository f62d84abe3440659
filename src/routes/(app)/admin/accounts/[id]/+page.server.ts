import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { idForm, setUnitsForm } from '$lib/domain/accounts/forms';
import { notFound } from '$lib/domain/core/errors';
import { m } from '$lib/i18n/paraglide/messages';
import { listAccounts } from '$lib/server/accounts/list';
import { disableAccount, enableAccount, inviteAgain, setSenior, setUnits } from '$lib/server/accounts/manage';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { idParam } from '$lib/server/http/param';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const { accounts, units } = await listAccounts(context);
		const account = accounts.find(({ id }) => id === event.params.id);
		if (!account) {
			throw notFound('account');
		}
		const { unitIds } = account;
		return {
			account,
			allUnits: units,
			isSelf: account.id === context.actor.id,
			units: await superValidate<{ units: string[] }, string>({ units: unitIds }, zod4(setUnitsForm), {
				id: 'units'
			}),
			keys: {
				units: newFormKey(),
				invite: newFormKey(),
				senior: newFormKey(),
				disable: newFormKey(),
				enable: newFormKey()
			}
		};
	});

export const actions: Actions = {
	units: formAction({
		id: 'units',
		schema: setUnitsForm,
		async run(context, { units }, event) {
			await setUnits(context, idParam(event), units);
			return m.account_units_set();
		}
	}),
	senior: formAction({
		id: 'row',
		schema: idForm,
		async run(context, { id }, event) {
			await setSenior(context, idParam(event), id === 'yes');
			return m.levels_senior_done();
		}
	}),
	invite: formAction({
		id: 'row',
		schema: idForm,
		async run(context, _fields, event) {
			await inviteAgain(context, idParam(event));
			return m.account_link_sent();
		}
	}),
	disable: formAction({
		id: 'row',
		schema: idForm,
		async run(context, _fields, event) {
			await disableAccount(context, idParam(event));
			return m.account_disabled_now();
		}
	}),
	enable: formAction({
		id: 'row',
		schema: idForm,
		async run(context, _fields, event) {
			await enableAccount(context, idParam(event));
			return m.account_enabled_now();
		}
	})
};
