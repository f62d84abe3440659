import { pageLoad } from '$lib/server/http/page';
import { pageRequest } from '$lib/server/http/paging';
import { listMessages, logFilterOf } from '$lib/server/messages/log';
import type { PageServerLoad } from './$types';

const SHOWN = 50;

/** How each message fared, the newest first. */
export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const filter = logFilterOf(event.url);
		return { filter, log: await listMessages(context, filter, pageRequest(event.url, SHOWN)) };
	});
