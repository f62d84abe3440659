import { sessionBody } from '$lib/domain/bedside/forms';
import { recordSession } from '$lib/server/bedside/actions';
import { reading, writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { read } from '$lib/server/read';

export const GET = reading({
	permission: 'session.read',
	run: async (context, event) => ({ items: await read.sessions(context, idParam(event)), next: null })
});

export const POST = writing({
	permission: 'session.record',
	body: sessionBody,
	status: 201,
	run: (context, input, event) => recordSession(context, idParam(event), input)
});
