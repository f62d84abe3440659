import { redirect } from '@sveltejs/kit';
import { z } from 'zod';
import { m } from '$lib/i18n/paraglide/messages';
import { reviewPrecautions } from '$lib/server/clearances/precautions';
import { acknowledgeDeviation } from '$lib/server/bedside/deviations';
import { idParam } from '$lib/server/http/param';
import { routes } from '$lib/routes';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { askClearanceAction, askForm } from '../ask-clearance';
import { leadOnWithoutScript } from '../without-script';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async () => {
		const { nameboard, now, zone } = await event.parent();
		return {
			form: await askForm(nameboard.clearances, { now, zone }),
			key: newFormKey(),
			seenKey: newFormKey(),
			reviewKey: newFormKey()
		};
	});

const acknowledge = formAction({
	schema: z.object({ deviationId: z.string().min(1) }),
	id: 'acknowledge',
	run: async (context, { deviationId }, event) => {
		await acknowledgeDeviation(context, deviationId);
		leadOnWithoutScript(event, event.url.pathname);
		return m.clearances_done();
	}
});

/** The question is put, and the page of the decision follows. */
const review = formAction({
	schema: z.object({}),
	id: 'review',
	run: async (context, _fields, event) => {
		const { result } = await reviewPrecautions(context, idParam(event));
		redirect(303, routes.clearance(idParam(event), result.id));
	}
});

export const actions: Actions = { ask: askClearanceAction, acknowledge, review };
