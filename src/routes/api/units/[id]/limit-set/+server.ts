import { chooseUnitSetBody } from '$lib/domain/limits/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { chooseUnitSet } from '$lib/server/limits/unit-actions';

export const POST = writing({
	permission: 'limit.change',
	body: chooseUnitSetBody,
	status: 201,
	run: (context, input, event) => chooseUnitSet(context, idParam(event), input)
});
