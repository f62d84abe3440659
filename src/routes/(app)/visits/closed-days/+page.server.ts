import { requirePermission } from '$lib/server/access/require';
import { pageLoad } from '$lib/server/http/page';
import { closedDaysAhead } from '$lib/server/visits/closed-days';
import type { PageServerLoad } from './$types';

/** The days ahead on which the hospital receives no visits. */
export const load: PageServerLoad = (event) =>
	pageLoad(event, async ({ actor, now }) => {
		requirePermission(actor, 'closed-day.keep');
		return { closed: { items: await closedDaysAhead(now), next: null } };
	});
