import { referBody } from '$lib/domain/referrals/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { refer } from '$lib/server/referrals/actions';

export const POST = writing({
	permission: 'referral.create',
	body: referBody,
	status: 201,
	run: (context, input, event) => refer(context, idParam(event), input)
});
