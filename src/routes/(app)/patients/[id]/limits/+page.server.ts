import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import type { z } from 'zod';
import { idForm } from '$lib/domain/accounts/forms';
import { invalidField } from '$lib/domain/core/errors';
import { setPatientLimitForm } from '$lib/domain/limits/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { idParam } from '$lib/server/http/param';
import { endPatientLimit, setPatientLimit } from '$lib/server/limits/patient-actions';
import { read } from '$lib/server/read';
import type { Actions, PageServerLoad } from './$types';

type Fields = z.output<typeof setPatientLimitForm>;

/** Nothing is chosen beforehand, least of all the last day. */
const NOTHING = { key: '', reason: '', untilOn: '' } as unknown as Fields;

export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => ({
		limits: { items: await read.patientLimits(context, idParam(event)), next: null },
		form: await superValidate<Fields, string>(zod4(setPatientLimitForm), { id: 'set', defaults: NOTHING }),
		keys: { set: newFormKey(), end: newFormKey() }
	}));

export const actions: Actions = {
	set: formAction({
		id: 'set',
		schema: setPatientLimitForm,
		async run(context, { value, ...fields }, event) {
			if (value === undefined) {
				throw invalidField('/value', m.limits_value_missing());
			}
			await setPatientLimit(context, idParam(event), { ...fields, value });
			return m.limits_patient_done();
		}
	}),
	end: formAction({
		id: 'end',
		schema: idForm,
		async run(context, { id }) {
			await endPatientLimit(context, id);
			return m.limits_patient_end_done();
		}
	})
};
