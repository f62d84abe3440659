import { bookVisitsBody } from '$lib/domain/visits/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { bookVisits } from '$lib/server/visits/actions';

export const POST = writing({
	permission: 'visit.plan',
	body: bookVisitsBody,
	status: 201,
	run: (context, input, event) => bookVisits(context, idParam(event), input)
});
