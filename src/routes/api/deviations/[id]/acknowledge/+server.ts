import { emptyBody } from '$lib/domain/escalations/forms';
import { acknowledgeDeviation } from '$lib/server/bedside/deviations';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'clearance.decide',
	body: emptyBody,
	run: (context, _input, event) => acknowledgeDeviation(context, idParam(event))
});
