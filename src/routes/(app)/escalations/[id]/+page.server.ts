import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import type { Problem } from '$lib/domain/core/errors';
import { takeForm } from '$lib/domain/escalations/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { env } from '$lib/server/env';
import { receiversOf } from '$lib/server/escalations/receivers';
import { takeEscalation } from '$lib/server/escalations/take';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { idParam } from '$lib/server/http/param';
import { read } from '$lib/server/read';
import type { Actions, PageServerLoad } from './$types';

/** Opening it takes nothing. */
export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const { id } = event.params;
		const [escalation, receivers, take] = await Promise.all([
			read.escalation(context, id),
			receiversOf(context, id),
			superValidate(zod4(takeForm))
		]);
		const { phone } = env().hospital;
		return { escalation, receivers, take, takeKey: newFormKey(), unitId: escalation.unitId, phone };
	});

/** Who was faster stands in the problem; the page that comes back shows since when. */
function fasterWords({ detail, extra }: Problem): string {
	const holder = extra.takenBy as { name: string } | null | undefined;
	return holder ? m.escalations_faster({ name: holder.name }) : detail;
}

export const actions: Actions = {
	take: formAction({
		schema: takeForm,
		words: { 'already-taken': fasterWords },
		async run(context, { etaMinutes }, event) {
			await takeEscalation(context, idParam(event), etaMinutes ?? null);
			return m.escalations_taken_by_you();
		}
	})
};
