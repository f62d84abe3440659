import { emptyBody } from '$lib/domain/escalations/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { followUpVisit } from '$lib/server/visits/actions';

/** Nothing more is to be done about a visit that the patient cancelled. */
export const POST = writing({
	permission: 'visit.plan',
	body: emptyBody,
	run: (context, _input, event) => followUpVisit(context, idParam(event))
});
