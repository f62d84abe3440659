import { reading } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { read } from '$lib/server/read';

export const GET = reading({
	permission: 'thread.read',
	run: (context, event) => read.clearance(context, idParam(event))
});
