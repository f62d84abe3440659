import { z } from 'zod';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { openDay } from '$lib/server/visits/closed-days';

/** Take a day off the list of closed days. */
export const POST = writing({
	permission: 'closed-day.keep',
	body: z.strictObject({}).prefault({}),
	run: (context, _input, event) => openDay(context, idParam(event))
});
