import { withdrawBody } from '$lib/domain/escalations/forms';
import { withdrawEscalation } from '$lib/server/escalations/end';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'escalation.withdraw',
	body: withdrawBody,
	run: (context, { reason }, event) => withdrawEscalation(context, idParam(event), reason)
});
