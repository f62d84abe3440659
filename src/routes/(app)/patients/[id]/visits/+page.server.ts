import { idParam } from '$lib/server/http/param';
import { pageLoad } from '$lib/server/http/page';
import { sharingOf } from '$lib/server/patient-page/share';
import { closedDaysAhead } from '$lib/server/visits/closed-days';
import { visitItemsOf } from '$lib/server/visits/queries';
import type { PageServerLoad } from './$types';

/** All visits of the patient, with what became of their reminders. */
export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const id = idParam(event);
		const [visits, sharing, closed] = await Promise.all([
			visitItemsOf(context.actor, id),
			sharingOf(context, id),
			closedDaysAhead(context.now)
		]);
		return { visits, sharing, closed };
	});
