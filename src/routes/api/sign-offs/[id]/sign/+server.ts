import { emptyBody } from '$lib/domain/escalations/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { sign } from '$lib/server/levels/sign-off';

export const POST = writing({
	permission: 'sign-off.decide',
	body: emptyBody,
	run: (context, _input, event) => sign(context, idParam(event))
});
