import { changeUnitLimitBody } from '$lib/domain/limits/forms';
import { reading, writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { changeUnitLimit } from '$lib/server/limits/unit-actions';
import { read } from '$lib/server/read';

/** Limits are about no patient: whoever is signed in may see what judges. */
export const GET = reading({
	permission: 'own-account.change',
	run: (_context, event) => read.unitLimits(idParam(event))
});

export const POST = writing({
	permission: 'limit.change',
	body: changeUnitLimitBody,
	status: 201,
	run: (context, input, event) => changeUnitLimit(context, idParam(event), input)
});
