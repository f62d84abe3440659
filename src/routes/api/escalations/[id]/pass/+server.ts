import { passBody } from '$lib/domain/escalations/forms';
import { passEscalation } from '$lib/server/escalations/pass';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'escalation.take',
	body: passBody,
	run: (context, input, event) => passEscalation(context, idParam(event), input)
});
