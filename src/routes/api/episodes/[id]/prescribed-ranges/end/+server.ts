import { emptyBody } from '$lib/domain/escalations/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { endRange } from '$lib/server/limits/range-actions';

export const POST = writing({
	permission: 'range.prescribe',
	body: emptyBody,
	run: (context, _input, event) => endRange(context, idParam(event))
});
