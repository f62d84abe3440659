import { sendPageBody } from '$lib/domain/patient-page/forms';
import { reading, writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { sendPage, sharingOf } from '$lib/server/patient-page/share';

/** Whether the patient has a link to their page, and by which ways one can be sent. */
export const GET = reading({
	permission: 'visit.read',
	run: (context, event) => sharingOf(context, idParam(event))
});

/** Send the patient the link to their page. */
export const POST = writing({
	permission: 'visit.plan',
	body: sendPageBody,
	status: 201,
	run: (context, { way }, event) => sendPage(context, idParam(event), way)
});
