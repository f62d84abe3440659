import { bookVisitsBody } from '$lib/domain/visits/forms';
import { reading, writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { bookVisits } from '$lib/server/visits/actions';
import { visitItemsOf } from '$lib/server/visits/queries';

/** All visits of one patient, with what became of their reminders. */
export const GET = reading({
	permission: 'visit.read',
	run: ({ actor }, event) => visitItemsOf(actor, idParam(event))
});

export const POST = writing({
	permission: 'visit.plan',
	body: bookVisitsBody,
	status: 201,
	run: (context, input, event) => bookVisits(context, idParam(event), input)
});
