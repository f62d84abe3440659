import { giveClearanceBody } from '$lib/domain/clearances/forms';
import { giveClearance } from '$lib/server/clearances/actions';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'clearance.decide',
	body: giveClearanceBody,
	run: (context, { shown, decidedAt, ...input }, event) =>
		giveClearance(context, idParam(event), input, { evidence: shown, decidedAt })
});
