import { deviceKind } from '$lib/domain/push/devices';
import { deviceBody } from '$lib/domain/push/forms';
import { writing } from '$lib/server/http/endpoint';
import { deviceIn, markDevice } from '$lib/server/push/cookie';
import { addDevice } from '$lib/server/push/devices';

/**
 * Show notices on the browser that asks, by what it got from its push service. The mark that it gets makes this one
 * device however often it is sent, so that no key is needed.
 */
export const POST = writing({
	permission: 'own-account.change',
	body: deviceBody,
	status: 201,
	run: (context, body, { cookies, request, locals }) =>
		addDevice({ ...context, key: null }, body, {
			kind: deviceKind(request.headers.get('user-agent')),
			tokenHash: deviceIn(cookies) ?? markDevice(cookies),
			signInId: locals.signInId
		})
});
