import { visitMoveBody } from '$lib/domain/visits/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { attendVisit } from '$lib/server/visits/actions';

export const POST = writing({
	permission: 'visit.attend',
	body: visitMoveBody,
	run: (context, { reason }, event) => attendVisit(context, idParam(event), reason ?? null)
});
