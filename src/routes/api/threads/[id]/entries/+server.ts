import { entryBody } from '$lib/domain/referrals/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { postEntry } from '$lib/server/threads/actions';

export const POST = writing({
	permission: 'entry.write',
	body: entryBody,
	status: 201,
	run: (context, input, event) => postEntry(context, idParam(event), input)
});
