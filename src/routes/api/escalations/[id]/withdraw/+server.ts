import { reasonBody } from '$lib/domain/clearances/forms';
import { withdrawEscalation } from '$lib/server/escalations/end';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'escalation.withdraw',
	body: reasonBody,
	run: (context, { reason }, event) => withdrawEscalation(context, idParam(event), reason)
});
