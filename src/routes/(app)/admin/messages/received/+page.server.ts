import { pageLoad } from '$lib/server/http/page';
import { pageRequest } from '$lib/server/http/paging';
import { listReceived } from '$lib/server/messages/received';
import type { PageServerLoad } from './$types';

const SHOWN = 50;

/** What came in, from whom, and what it did. */
export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => ({
		received: await listReceived(context, pageRequest(event.url, SHOWN))
	}));
