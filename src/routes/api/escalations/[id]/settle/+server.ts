import { settleBody } from '$lib/domain/escalations/forms';
import { settleEscalation } from '$lib/server/escalations/end';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'escalation.take',
	body: settleBody,
	run: (context, input, event) => settleEscalation(context, idParam(event), input)
});
