import { lineInBody } from '$lib/domain/lines/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { noteLineIn } from '$lib/server/lines/actions';

export const POST = writing({
	permission: 'line.note',
	body: lineInBody,
	status: 201,
	run: (context, input, event) => noteLineIn(context, idParam(event), input)
});
