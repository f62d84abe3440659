import { z } from 'zod';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { endPage } from '$lib/server/patient-page/share';

/** End the link to a patient's page at once. */
export const POST = writing({
	permission: 'visit.plan',
	body: z.strictObject({}).prefault({}),
	run: (context, _input, event) => endPage(context, idParam(event))
});
