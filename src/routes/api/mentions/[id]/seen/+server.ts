import { emptyBody } from '$lib/domain/escalations/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { markSeen } from '$lib/server/threads/actions';

export const POST = writing({
	permission: 'thread.read',
	body: emptyBody,
	run: (context, _input, event) => markSeen(context, idParam(event))
});
