import { takeBody } from '$lib/domain/escalations/forms';
import { takeEscalation } from '$lib/server/escalations/take';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'escalation.take',
	body: takeBody,
	run: (context, { etaMinutes }, event) => takeEscalation(context, idParam(event), etaMinutes ?? null)
});
