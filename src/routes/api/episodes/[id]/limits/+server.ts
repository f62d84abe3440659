import { setPatientLimitBody } from '$lib/domain/limits/forms';
import { reading, writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { setPatientLimit } from '$lib/server/limits/patient-actions';
import { read } from '$lib/server/read';

export const GET = reading({
	permission: 'session.read',
	run: async (context, event) => ({ items: await read.patientLimits(context, idParam(event)), next: null })
});

export const POST = writing({
	permission: 'limit.set-for-patient',
	body: setPatientLimitBody,
	status: 201,
	run: (context, input, event) => setPatientLimit(context, idParam(event), input)
});
