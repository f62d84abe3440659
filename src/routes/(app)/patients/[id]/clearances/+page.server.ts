import { newFormKey, pageLoad } from '$lib/server/http/page';
import { askClearanceAction, askForm } from '../ask-clearance';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async () => {
		const { nameboard, now, zone } = await event.parent();
		return { form: await askForm(nameboard.clearances, { now, zone }), key: newFormKey() };
	});

export const actions: Actions = { ask: askClearanceAction };
