import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import type { z } from 'zod';
import { idForm } from '$lib/domain/accounts/forms';
import { LEVELS } from '$lib/domain/core/codes';
import { invalidField } from '$lib/domain/core/errors';
import { decideLevelForm, refuseSignOffForm } from '$lib/domain/levels/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { idParam } from '$lib/server/http/param';
import { decideLevel } from '$lib/server/levels/actions';
import { refuseToSign, sign } from '$lib/server/levels/sign-off';
import { read } from '$lib/server/read';
import type { Actions, PageServerLoad } from './$types';

const refuseForm = refuseSignOffForm.extend({ id: idForm.shape.id });
type Fields = z.output<typeof decideLevelForm>;

export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const level = await read.level(context, idParam(event));
		// The advice is proposed where it leads somewhere; else nothing is chosen beforehand.
		const to = level.advice && level.advice.to !== level.today ? `${level.advice.to}` : '';
		return {
			level,
			decide: await superValidate<Fields, string>(zod4(decideLevelForm), {
				id: 'decide',
				defaults: { to, reason: '' } as Fields
			}),
			refuse: await superValidate(zod4(refuseForm), { id: 'refuse' }),
			keys: { decide: newFormKey(), sign: newFormKey(), refuse: newFormKey() }
		};
	});

export const actions: Actions = {
	decide: formAction({
		id: 'decide',
		schema: decideLevelForm,
		async run(context, fields, event) {
			const to = LEVELS.find((level) => `${level}` === fields.to);
			if (to === undefined) {
				throw invalidField('/to', m.levels_choose());
			}
			const input = fields.reason === '' ? { to } : { to, reason: fields.reason };
			const { result } = await decideLevel(context, idParam(event), input);
			return result.state === 'made' ? m.levels_made({ level: result.level }) : m.levels_asked();
		}
	}),
	sign: formAction({
		id: 'sign',
		schema: idForm,
		async run(context, { id }) {
			await sign(context, id);
			return m.levels_signed_now();
		}
	}),
	refuse: formAction({
		id: 'refuse',
		schema: refuseForm,
		async run(context, { id, reason }) {
			await refuseToSign(context, id, reason);
			return m.levels_refused_now();
		}
	})
};
