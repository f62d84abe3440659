import { declineBody } from '$lib/domain/referrals/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { withdrawReferral } from '$lib/server/referrals/actions';

export const POST = writing({
	permission: 'referral.withdraw',
	body: declineBody,
	run: (context, { reason }, event) => withdrawReferral(context, idParam(event), reason)
});
