import { askClearanceBody } from '$lib/domain/clearances/forms';
import { askClearance } from '$lib/server/clearances/actions';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'clearance.ask',
	body: askClearanceBody,
	status: 201,
	run: (context, input, event) => askClearance(context, idParam(event), input)
});
