import { reading } from '$lib/server/http/endpoint';
import { pageRequest } from '$lib/server/http/paging';
import { listReceived } from '$lib/server/messages/received';

/** What came in by text and by telephone, the newest first. */
export const GET = reading({
	permission: 'message-log.read',
	run: (context, { url }) => listReceived(context, pageRequest(url))
});
