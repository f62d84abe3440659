import { refuseSignOffBody } from '$lib/domain/levels/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { refuseToSign } from '$lib/server/levels/sign-off';

export const POST = writing({
	permission: 'sign-off.decide',
	body: refuseSignOffBody,
	run: (context, { reason }, event) => refuseToSign(context, idParam(event), reason)
});
