import { redirect } from '@sveltejs/kit';
import { superValidate, type Infer } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { isOneOf, CLOSE_REASONS } from '$lib/domain/core/codes';
import { invalidField, Problem } from '$lib/domain/core/errors';
import { closeForm, moveForm } from '$lib/domain/episodes/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { routes } from '$lib/routes';
import { requirePermission } from '$lib/server/access/require';
import { allUnits } from '$lib/server/access/units';
import { closeEpisode } from '$lib/server/episodes/close';
import { movePatient } from '$lib/server/episodes/move';
import { read } from '$lib/server/read';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { idParam } from '$lib/server/http/param';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		requirePermission(context.actor, 'episode.close');
		return {
			call: await read.openCall(context, idParam(event)),
			hospitalUnits: await allUnits(),
			move: await superValidate<Infer<typeof moveForm, 'zod4'>, string>(zod4(moveForm), { id: 'move' }),
			close: await superValidate<Infer<typeof closeForm, 'zod4'>, string>(zod4(closeForm), { id: 'close' }),
			keys: { move: newFormKey(), close: newFormKey() }
		};
	});

export const actions: Actions = {
	move: formAction({
		id: 'move',
		schema: moveForm,
		async run(context, { unit, bed, toldHolder }, event) {
			requirePermission(context.actor, 'episode.move');
			if (!toldHolder && (await read.openCall(context, idParam(event))) !== null) {
				throw invalidField('/toldHolder', m.patient_move_tell_first());
			}
			const { result } = await besideBed(() => movePatient(context, idParam(event), { unit, bed }));
			const stays = context.actor.unitIds.includes(result.unitId);
			redirect(303, stays ? routes.patient(result.id) : routes.ward());
		}
	}),
	close: formAction({
		id: 'close',
		schema: closeForm,
		async run(context, { reason }, event) {
			if (!isOneOf(CLOSE_REASONS, reason)) {
				throw invalidField('/reason', 'The reason is empty: choose why the episode is over.');
			}
			await closeEpisode(context, idParam(event), reason);
			redirect(303, routes.ward());
		}
	})
};

/** A bed in use is wrong in the field of the bed. */
async function besideBed<T>(work: () => Promise<T>): Promise<T> {
	try {
		return await work();
	} catch (thrown) {
		if (thrown instanceof Problem && thrown.code === 'bed-in-use') {
			throw invalidField('/bed', thrown.detail);
		}
		throw thrown;
	}
}
