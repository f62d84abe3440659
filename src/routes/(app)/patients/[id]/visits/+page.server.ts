import { idParam } from '$lib/server/http/param';
import { pageLoad } from '$lib/server/http/page';
import { visitItemsOf } from '$lib/server/visits/queries';
import type { PageServerLoad } from './$types';

/** All visits of the patient, with what became of their reminders. */
export const load: PageServerLoad = (event) =>
	pageLoad(event, async ({ actor }) => ({ visits: await visitItemsOf(actor, idParam(event)) }));
