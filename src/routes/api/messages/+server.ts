import { reading } from '$lib/server/http/endpoint';
import { pageRequest } from '$lib/server/http/paging';
import { listMessages, logFilterOf } from '$lib/server/messages/log';

/** The message log, the newest first; `?q=&state=&channel=` narrow it. */
export const GET = reading({
	permission: 'message-log.read',
	run: (context, { url }) => listMessages(context, logFilterOf(url), pageRequest(url))
});
