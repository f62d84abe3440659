import { rescheduleBody } from '$lib/domain/visits/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { rescheduleVisit } from '$lib/server/visits/reschedule';

/** Another time, length or place; it stays the same visit. */
export const POST = writing({
	permission: 'visit.plan',
	body: rescheduleBody,
	run: (context, input, event) => rescheduleVisit(context, idParam(event), input)
});
