import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { z } from 'zod';
import { idForm } from '$lib/domain/accounts/forms';
import { numberOf } from '$lib/domain/core/typed-number';
import { setPatientLimitBody } from '$lib/domain/limits/forms';
import { endsOf, prescribeRangeForm, setPatientLimitForm } from '$lib/domain/limits/page-forms';
import { m } from '$lib/i18n/paraglide/messages';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { idParam } from '$lib/server/http/param';
import { endRange, prescribeRange } from '$lib/server/limits/range-actions';
import { endPatientLimit, setPatientLimit } from '$lib/server/limits/patient-actions';
import { read } from '$lib/server/read';
import type { Actions, PageServerLoad } from './$types';

type Fields = z.output<typeof setPatientLimitForm>;
type RangeFields = z.output<typeof prescribeRangeForm>;

const NO_RANGE = {
	hrMin: '',
	hrMax: '',
	rpeMin: '',
	rpeMax: '',
	method: '',
	note: ''
} as unknown as RangeFields;

/** Nothing is chosen beforehand, least of all the last day. */
const NOTHING = { key: '', value: '', reason: '', untilOn: '' } as unknown as Fields;

export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => ({
		limits: { items: await read.patientLimits(context, idParam(event)), next: null },
		form: await superValidate<Fields, string>(zod4(setPatientLimitForm), { id: 'set', defaults: NOTHING }),
		ranges: { items: await read.ranges(context, idParam(event)), next: null },
		range: await superValidate<RangeFields, string>(zod4(prescribeRangeForm), {
			id: 'prescribe',
			defaults: NO_RANGE
		}),
		keys: { set: newFormKey(), end: newFormKey(), prescribe: newFormKey(), endRange: newFormKey() }
	}));

export const actions: Actions = {
	set: formAction({
		id: 'set',
		schema: setPatientLimitForm,
		async run(context, { value, ...fields }, event) {
			const number = setPatientLimitBody.shape.value.parse(numberOf(value));
			await setPatientLimit(context, idParam(event), { ...fields, value: number });
			return m.limits_patient_done();
		}
	}),
	prescribe: formAction({
		id: 'prescribe',
		schema: prescribeRangeForm,
		async run(context, { note, method, ...typed }, event) {
			const range = { ...endsOf(typed), method };
			await prescribeRange(context, idParam(event), note === '' ? range : { ...range, note });
			return m.limits_range_done();
		}
	}),
	endRange: formAction({
		id: 'end-range',
		schema: z.object({}),
		async run(context, _fields, event) {
			await endRange(context, idParam(event));
			return m.limits_range_end_done();
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
