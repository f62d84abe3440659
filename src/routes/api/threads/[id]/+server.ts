import { reading } from '$lib/server/http/endpoint';
import { pageRequest } from '$lib/server/http/paging';
import { idParam } from '$lib/server/http/param';
import { read } from '$lib/server/read';

export const GET = reading({
	permission: 'thread.read',
	run: (context, event) => read.thread(context, idParam(event), pageRequest(event.url))
});
