import { acceptBody } from '$lib/domain/referrals/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { closeReferral } from '$lib/server/referrals/actions';

export const POST = writing({
	permission: 'referral.close',
	body: acceptBody,
	run: (context, { reason }, event) => closeReferral(context, idParam(event), reason ?? null)
});
