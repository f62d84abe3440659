import { pageLoad } from '$lib/server/http/page';
import { idParam } from '$lib/server/http/param';
import { read } from '$lib/server/read';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => ({
		sessions: { items: await read.sessions(context, idParam(event)), next: null }
	}));
