import { reasonBody } from '$lib/domain/clearances/forms';
import { withdrawClearance } from '$lib/server/clearances/actions';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'thread.read',
	body: reasonBody,
	run: (context, { reason }, event) => withdrawClearance(context, idParam(event), reason)
});
