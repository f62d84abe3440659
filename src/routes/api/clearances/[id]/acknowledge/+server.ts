import { emptyBody } from '$lib/domain/escalations/forms';
import { acknowledgeRefusal } from '$lib/server/clearances/refusal';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'thread.read',
	body: emptyBody,
	run: (context, _input, event) => acknowledgeRefusal(context, idParam(event))
});
