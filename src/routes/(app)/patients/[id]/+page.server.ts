import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { can } from '$lib/domain/access/can';
import { invalidField } from '$lib/domain/core/errors';
import { woundNoteForm, woundNoteOf } from '$lib/domain/wounds/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { idParam } from '$lib/server/http/param';
import { read } from '$lib/server/read';
import { noteWound } from '$lib/server/wounds/actions';
import type { Actions, PageServerLoad } from './$types';
import { leadOnWithoutScript } from './without-script';

/** The sessions, for those who may read them; the layout has the rest. */
export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const maySee = can(context.actor, 'session.read');
		const items = maySee ? await read.sessions(context, idParam(event)) : [];
		return {
			sessions: { items, next: null },
			maySeeSessions: maySee,
			wound: await superValidate(zod4(woundNoteForm), { id: 'wound', errors: false }),
			woundKey: newFormKey()
		};
	});

export const actions: Actions = {
	wound: formAction({
		id: 'wound',
		schema: woundNoteForm,
		async run(context, fields, event) {
			const input = woundNoteOf(fields);
			if (Object.keys(input).length === 0) {
				throw invalidField('/note', m.wounds_nothing_said());
			}
			await noteWound(context, idParam(event), input);
			leadOnWithoutScript(event, event.url.pathname);
			return m.wounds_noted();
		}
	})
};
