import { reading } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { read } from '$lib/server/read';

export const GET = reading({
	permission: 'episode.read',
	run: (context, event) => read.nameboard(context, idParam(event))
});
