import { sendPageBody } from '$lib/domain/patient-page/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { sendPage } from '$lib/server/patient-page/share';

/** Send the patient the link to their page. */
export const POST = writing({
	permission: 'visit.plan',
	body: sendPageBody,
	status: 201,
	run: (context, { way }, event) => sendPage(context, idParam(event), way)
});
