import { reading } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { read } from '$lib/server/read';

export const GET = reading({
	permission: 'escalation.read',
	run: (context, event) => read.escalation(context, idParam(event))
});
