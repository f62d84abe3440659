import { can } from '$lib/domain/access/can';
import { idParam } from '$lib/server/http/param';
import { pageLoad } from '$lib/server/http/page';
import { read } from '$lib/server/read';
import type { PageServerLoad } from './$types';

/** The sessions, for those who may read them; the layout has the rest. */
export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const maySee = can(context.actor, 'session.read');
		const items = maySee ? await read.sessions(context, idParam(event)) : [];
		return { sessions: { items, next: null }, maySeeSessions: maySee };
	});
