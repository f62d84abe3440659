import { reading } from '$lib/server/http/endpoint';
import { pageRequest } from '$lib/server/http/paging';
import { listVisits, visitRangeOf } from '$lib/server/visits/queries';

/** The visits of a week, or of `?from=&to=`. */
export const GET = reading({
	permission: 'visit.read',
	run: ({ actor, now }, { url }) => listVisits(actor, visitRangeOf(url, now), pageRequest(url))
});
