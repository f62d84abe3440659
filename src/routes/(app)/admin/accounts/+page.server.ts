import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import type { z } from 'zod';
import { createAccountBody, createUnitBody } from '$lib/domain/accounts/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { listAccounts } from '$lib/server/accounts/list';
import { createAccount, createUnit } from '$lib/server/accounts/manage';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import type { Actions, PageServerLoad } from './$types';

type NewAccount = z.output<typeof createAccountBody>;
type NewUnit = z.output<typeof createUnitBody>;

/** Nothing is chosen beforehand: a role that nobody picked is a role that nobody thought about. */
const NOBODY = { name: '', email: '', role: '', phone: '', units: [] } as unknown as NewAccount;
const NO_UNIT = { name: '', kind: '' } as unknown as NewUnit;

export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => ({
		...(await listAccounts(context)),
		account: await superValidate<NewAccount, string>(zod4(createAccountBody), {
			id: 'account',
			defaults: NOBODY
		}),
		unit: await superValidate<NewUnit, string>(zod4(createUnitBody), { id: 'unit', defaults: NO_UNIT }),
		accountKey: newFormKey(),
		unitKey: newFormKey()
	}));

export const actions: Actions = {
	account: formAction({
		id: 'account',
		schema: createAccountBody,
		async run(context, fields) {
			await createAccount(context, fields);
			return m.account_invited({ email: fields.email });
		}
	}),
	unit: formAction({
		id: 'unit',
		schema: createUnitBody,
		async run(context, fields) {
			await createUnit(context, fields);
			return m.account_unit_made({ name: fields.name });
		}
	})
};
