import { wordActivityBody } from '$lib/domain/limits/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { wordActivity } from '$lib/server/limits/activity-actions';

export const POST = writing({
	permission: 'limit.change',
	body: wordActivityBody,
	status: 201,
	run: (context, input, event) => wordActivity(context, idParam(event), input)
});
