import { closedDayBody } from '$lib/domain/visits/forms';
import { reading, writing } from '$lib/server/http/endpoint';
import { closeDay, closedDaysAhead } from '$lib/server/visits/closed-days';

/** The days ahead on which the hospital receives no visits. */
export const GET = reading({
	permission: 'own-account.change',
	run: async ({ now }) => ({ items: await closedDaysAhead(now), next: null })
});

export const POST = writing({
	permission: 'closed-day.keep',
	body: closedDayBody,
	status: 201,
	run: (context, input) => closeDay(context, input)
});
