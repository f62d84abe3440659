import { pageLoad } from '$lib/server/http/page';
import { read } from '$lib/server/read';
import type { PageServerLoad } from './$types';

/** Who is on cover at this moment, on the units of the person. */
export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => ({ shifts: await read.cover(context), readAt: context.now }));
