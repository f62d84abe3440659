import { visitMoveBody } from '$lib/domain/visits/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { cancelVisit } from '$lib/server/visits/actions';

export const POST = writing({
	permission: 'visit.plan',
	body: visitMoveBody,
	run: (context, { reason }, event) => cancelVisit(context, idParam(event), reason ?? null)
});
