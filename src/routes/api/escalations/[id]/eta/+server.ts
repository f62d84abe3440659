import { etaBody } from '$lib/domain/escalations/forms';
import { giveEtaOf } from '$lib/server/escalations/arrive';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'escalation.take',
	body: etaBody,
	run: (context, { etaMinutes }, event) => giveEtaOf(context, idParam(event), etaMinutes)
});
