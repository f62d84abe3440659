import { emptyBody } from '$lib/domain/escalations/forms';
import { untakeEscalation } from '$lib/server/escalations/undo';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'escalation.take',
	body: emptyBody,
	run: (context, _input, event) => untakeEscalation(context, idParam(event))
});
