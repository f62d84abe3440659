import { acceptBody } from '$lib/domain/referrals/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { acceptReferral } from '$lib/server/referrals/actions';

export const POST = writing({
	permission: 'referral.answer',
	body: acceptBody,
	run: (context, _input, event) => acceptReferral(context, idParam(event))
});
