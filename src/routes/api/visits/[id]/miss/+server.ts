import { visitMoveBody } from '$lib/domain/visits/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { missVisit } from '$lib/server/visits/actions';

export const POST = writing({
	permission: 'visit.attend',
	body: visitMoveBody,
	run: (context, { reason }, event) => missVisit(context, idParam(event), reason ?? null)
});
