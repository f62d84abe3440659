import { redirect } from '@sveltejs/kit';
import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { Problem } from '$lib/domain/core/errors';
import { can } from '$lib/domain/access/can';
import { draftEscalation, NEEDED_WITHIN } from '$lib/domain/escalations/draft';
import { callOf, raiseForm } from '$lib/domain/escalations/forms';
import type { Nameboard } from '$lib/domain/episodes/views';
import { m } from '$lib/i18n/paraglide/messages';
import { routes } from '$lib/routes';
import type { PersonContext } from '$lib/server/context';
import { env } from '$lib/server/env';
import { takersOf } from '$lib/server/escalations/receivers';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { idParam } from '$lib/server/http/param';
import { read } from '$lib/server/read';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const { nameboard } = await event.parent();
		refuseRole(context, nameboard);
		const session = await sessionOf(context, nameboard.id, event.url.searchParams.get('session'));
		const { grade, ...parts } = draftEscalation(
			{ ...nameboard, maxElevationDeg: nameboard.precautions.maxElevationDeg },
			session,
			env().hospital.zone
		);
		const neededInMinutes = (grade && NEEDED_WITHIN[grade]) ?? undefined;
		const from = { sessionId: session?.id, threadId: threadOf(nameboard, event.url) };
		const filled = { ...parts, grade: grade ?? ('' as const), neededInMinutes, ...from };
		return {
			form: await superValidate(filled, zod4(raiseForm), { errors: false }),
			takers: await takersOf(context, nameboard.unitId),
			key: newFormKey(),
			emergency: env().hospital.emergency
		};
	});

/** The recorded session that the call is about; null for none, or one that is not of this patient. */
async function sessionOf(context: PersonContext, episodeId: string, id: string | null) {
	const sessions = id === null ? [] : await read.sessions(context, episodeId);
	return sessions.find((session) => session.id === id) ?? null;
}

/** The thread from which somebody calls; undefined for none, or one that is not of this patient. */
function threadOf({ threads }: Nameboard, url: URL): string | undefined {
	return threads.find(({ id }) => id === url.searchParams.get('thread'))?.id;
}

function refuseRole({ actor }: PersonContext, { unitId }: Nameboard): void {
	if (!can(actor, 'escalation.raise', { unitId })) {
		throw new Problem('not-allowed', m.escalations_raise_not_allowed());
	}
}

export const actions: Actions = {
	raise: formAction({
		schema: raiseForm,
		async run(context, form, event) {
			const call = callOf(form, context.now);
			const { result } = await raiseEscalation(context, idParam(event), call);
			redirect(303, routes.escalation(result.id));
		}
	})
};
