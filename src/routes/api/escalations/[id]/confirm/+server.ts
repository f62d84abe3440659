import { emptyBody } from '$lib/domain/escalations/forms';
import { confirmPass } from '$lib/server/escalations/pass';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'escalation.take',
	body: emptyBody,
	run: (context, _input, event) => confirmPass(context, idParam(event))
});
