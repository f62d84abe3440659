import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { can } from '$lib/domain/access/can';
import { idForm } from '$lib/domain/accounts/forms';
import { invalidField } from '$lib/domain/core/errors';
import { numberOf } from '$lib/domain/core/typed-number';
import { lineInBody, oxygenBody, oxygenForm, type OxygenFields } from '$lib/domain/lines/forms';
import { woundNoteForm, woundNoteOf } from '$lib/domain/wounds/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { idParam } from '$lib/server/http/param';
import { noteLineIn, noteLineOut, noteOxygen } from '$lib/server/lines/actions';
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
			woundKey: newFormKey(),
			lines: {
				oxygen: await superValidate<OxygenFields, string>(zod4(oxygenForm), { id: 'oxygen', errors: false }),
				keys: { in: newFormKey(), out: newFormKey(), oxygen: newFormKey() }
			}
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
	}),
	lineIn: formAction({
		id: 'line-in',
		schema: lineInBody,
		async run(context, fields, event) {
			await noteLineIn(context, idParam(event), fields);
			leadOnWithoutScript(event, event.url.pathname);
			return m.lines_noted();
		}
	}),
	lineOut: formAction({
		id: 'line-out',
		schema: idForm,
		async run(context, { id }, event) {
			await noteLineOut(context, id);
			leadOnWithoutScript(event, event.url.pathname);
			return m.lines_noted();
		}
	}),
	oxygen: formAction({
		id: 'oxygen',
		schema: oxygenForm,
		async run(context, { lpm }, event) {
			await noteOxygen(context, idParam(event), oxygenBody.parse({ lpm: numberOf(lpm) }));
			leadOnWithoutScript(event, event.url.pathname);
			return m.lines_noted();
		}
	})
};
