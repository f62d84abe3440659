import { emptyBody } from '$lib/domain/escalations/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { endPatientLimit } from '$lib/server/limits/patient-actions';

export const POST = writing({
	permission: 'limit.set-for-patient',
	body: emptyBody,
	run: (context, _input, event) => endPatientLimit(context, idParam(event))
});
