import { informBody } from '$lib/domain/escalations/forms';
import { informOfEscalation } from '$lib/server/escalations/end';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'escalation.take',
	body: informBody,
	run: (context, { informed }, event) => informOfEscalation(context, idParam(event), informed)
});
