import { refuseClearanceBody } from '$lib/domain/clearances/forms';
import { holdClearance } from '$lib/server/clearances/actions';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'clearance.decide',
	body: refuseClearanceBody,
	run: (context, { reason, shown, decidedAt }, event) =>
		holdClearance(context, idParam(event), reason, { evidence: shown, decidedAt })
});
