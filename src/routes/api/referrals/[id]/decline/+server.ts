import { declineBody } from '$lib/domain/referrals/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { declineReferral } from '$lib/server/referrals/actions';

export const POST = writing({
	permission: 'referral.answer',
	body: declineBody,
	run: (context, { reason }, event) => declineReferral(context, idParam(event), reason)
});
