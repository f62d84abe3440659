import type { RequestEvent } from '@sveltejs/kit';
import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { fieldsOf } from '$lib/components/clearances/decision';
import { giveForm, noFields, refuseForm } from '$lib/components/clearances/decision-forms';
import type { ClearanceView } from '$lib/domain/clearances/views';
import { notFound } from '$lib/domain/core/errors';
import type { PersonContext } from '$lib/server/context';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { idParam } from '$lib/server/http/param';
import { read } from '$lib/server/read';
import { acknowledge, answer, askBack, give, hold, withdraw, withhold } from './actions';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const clearance = await ofThisPatient(context, event.params.clearanceId, event);
		const fields = fieldsOf(clearance);
		return {
			clearance,
			forms: {
				give: await superValidate(fields, zod4(giveForm), { id: 'give', errors: false }),
				withhold: await superValidate(zod4(refuseForm), { id: 'withhold' }),
				hold: await superValidate(zod4(refuseForm), { id: 'hold' }),
				withdraw: await superValidate(zod4(refuseForm), { id: 'withdraw' }),
				askBack: await superValidate(zod4(refuseForm), { id: 'askBack' }),
				answer: await superValidate(zod4(refuseForm), { id: 'answer' })
			},
			keys: {
				give: newFormKey(),
				withhold: newFormKey(),
				hold: newFormKey(),
				withdraw: newFormKey(),
				askBack: newFormKey(),
				answer: newFormKey()
			},
			seenForm: await superValidate(zod4(noFields), { id: 'acknowledge' }),
			seenKey: newFormKey()
		};
	});

export const actions: Actions = { give, withhold, hold, withdraw, askBack, answer, acknowledge };

/** A clearance of another patient is not there: the nameboard above it would be the wrong one. */
async function ofThisPatient(
	context: PersonContext,
	id: string,
	event: RequestEvent
): Promise<ClearanceView> {
	const clearance = await read.clearance(context, id);
	if (clearance.episodeId !== idParam(event)) {
		throw notFound('clearance');
	}
	return clearance;
}
