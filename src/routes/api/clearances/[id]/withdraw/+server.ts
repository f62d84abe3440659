import { refuseClearanceBody } from '$lib/domain/clearances/forms';
import { withdrawClearance } from '$lib/server/clearances/actions';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'thread.read',
	body: refuseClearanceBody,
	run: (context, { reason, shown, decidedAt }, event) =>
		withdrawClearance(context, idParam(event), reason, { evidence: shown, decidedAt })
});
