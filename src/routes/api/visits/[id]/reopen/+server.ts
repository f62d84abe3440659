import { reopenBody } from '$lib/domain/visits/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { reopenVisit } from '$lib/server/visits/actions';

export const POST = writing({
	permission: 'visit.attend',
	body: reopenBody,
	run: (context, { reason }, event) => reopenVisit(context, idParam(event), reason)
});
