import { oxygenBody } from '$lib/domain/lines/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { noteOxygen } from '$lib/server/lines/actions';

export const POST = writing({
	permission: 'line.note',
	body: oxygenBody,
	status: 201,
	run: (context, input, event) => noteOxygen(context, idParam(event), input)
});
