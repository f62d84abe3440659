import { emptyBody } from '$lib/domain/escalations/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { noteLineOut } from '$lib/server/lines/actions';

export const POST = writing({
	permission: 'line.note',
	body: emptyBody,
	run: (context, _input, event) => noteLineOut(context, idParam(event))
});
