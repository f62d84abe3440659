import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import type { RequestEvent } from '@sveltejs/kit';
import type { z } from 'zod';
import { localDateOf } from '$lib/domain/core/time';
import { numberOf } from '$lib/domain/core/typed-number';
import { changeUnitLimitForm, chooseUnitSetForm } from '$lib/domain/limits/page-forms';
import { m } from '$lib/i18n/paraglide/messages';
import { listAccounts } from '$lib/server/accounts/list';
import { env } from '$lib/server/env';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { changeUnitLimit, chooseUnitSet } from '$lib/server/limits/unit-actions';
import { read } from '$lib/server/read';
import type { Actions, PageServerLoad } from './$types';

type LimitFields = z.output<typeof changeUnitLimitForm>;
type SetFields = z.output<typeof chooseUnitSetForm>;

export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const { units } = await listAccounts(context);
		const shown = unitOf(event) || units[0]?.id;
		const limits = shown ? await read.unitLimits(shown) : null;
		const agreed = { agreedBy: '', agreedOn: localDateOf(context.now, env().hospital.zone) };
		const limit = {
			set: limits?.inpatientSet ?? 'strict',
			key: '',
			value: '',
			...agreed
		} as unknown as LimitFields;
		const set = { set: limits?.inpatientSet ?? 'strict', ...agreed } as SetFields;
		return {
			allUnits: units.map(({ id, name }) => ({ id, name })),
			limits,
			limit: await superValidate<LimitFields, string>(zod4(changeUnitLimitForm), {
				id: 'limit',
				defaults: limit
			}),
			set: await superValidate<SetFields, string>(zod4(chooseUnitSetForm), { id: 'set', defaults: set }),
			keys: { limit: newFormKey(), set: newFormKey() }
		};
	});

export const actions: Actions = {
	limit: formAction({
		id: 'limit',
		schema: changeUnitLimitForm,
		async run(context, { value, ...fields }, event) {
			const { result } = await changeUnitLimit(context, unitOf(event), {
				...fields,
				value: numberOf(value)
			});
			return m.limits_changed({ version: result.version });
		}
	}),
	set: formAction({
		id: 'set',
		schema: chooseUnitSetForm,
		async run(context, fields, event) {
			const { result } = await chooseUnitSet(context, unitOf(event), fields);
			return m.limits_changed({ version: result.version });
		}
	})
};

function unitOf({ url }: Pick<RequestEvent, 'url'>): string {
	return url.searchParams.get('unit') ?? '';
}
