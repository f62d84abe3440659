import { amendSessionBody } from '$lib/domain/bedside/amendments';
import { amendSession } from '$lib/server/bedside/amend';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'session.record',
	body: amendSessionBody,
	status: 201,
	run: (context, input, event) => amendSession(context, idParam(event), input)
});
