import { emptyBody } from '$lib/domain/escalations/forms';
import { arriveAtEscalation } from '$lib/server/escalations/arrive';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'escalation.take',
	body: emptyBody,
	run: (context, _input, event) => arriveAtEscalation(context, idParam(event))
});
