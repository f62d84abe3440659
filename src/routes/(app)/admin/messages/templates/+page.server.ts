import { pageLoad } from '$lib/server/http/page';
import { listTemplates } from '$lib/server/messages/templates';
import type { PageServerLoad } from './$types';

/** What people get, word for word. */
export const load: PageServerLoad = (event) =>
	pageLoad(event, (context) => Promise.resolve({ previews: listTemplates(context) }));
