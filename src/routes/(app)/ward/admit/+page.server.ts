import { redirect } from '@sveltejs/kit';
import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { Problem } from '$lib/domain/core/errors';
import { zoneGroups } from '$lib/domain/core/zones';
import { admitForm, formFieldOf, toAdmission, type AdmitForm } from '$lib/domain/episodes/admit-form';
import { admitBody, type AdmitInput } from '$lib/domain/episodes/forms';
import { routes } from '$lib/routes';
import { requirePermission } from '$lib/server/access/require';
import { env } from '$lib/server/env';
import { admitPatient } from '$lib/server/episodes/actions';
import { surgeonsFor } from '$lib/server/episodes/surgeons';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { invalidBody } from '$lib/server/http/problem';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async ({ actor }) => {
		requirePermission(actor, 'episode.admit');
		const asked = event.url.searchParams.get('unit');
		const unit = actor.unitIds.find((id) => id === asked) ?? '';
		return {
			form: await superValidate<AdmitForm, string>({ unit }, zod4(admitForm), { errors: false }),
			key: newFormKey(),
			surgeons: await surgeonsFor(actor),
			zones: zoneGroups(env().hospital.zone)
		};
	});

export const actions: Actions = {
	default: formAction({
		schema: admitForm,
		async run(context, fields) {
			const body = admissionOf(toAdmission(fields, env().hospital.zone));
			const { result } = await besideFields(() => admitPatient(context, body));
			redirect(303, routes.patient(result.id));
		}
	})
};

function admissionOf(body: unknown): AdmitInput {
	const parsed = admitBody.safeParse(body);
	if (!parsed.success) {
		throw withFormFields(invalidBody(parsed.error));
	}
	return parsed.data;
}

async function besideFields<T>(work: () => Promise<T>): Promise<T> {
	try {
		return await work();
	} catch (thrown) {
		throw thrown instanceof Problem ? withFormFields(thrown) : thrown;
	}
}

/** The body of the API is nested and the form is flat; a bed in use is wrong in the field of the bed. */
function withFormFields(problem: Problem): Problem {
	const { code, detail, extra } = problem;
	const errors =
		code === 'bed-in-use'
			? [{ pointer: '/bed', message: detail }]
			: extra.errors?.map(({ pointer, message }) => ({ pointer: `/${formFieldOf(pointer)}`, message }));
	return new Problem(code, detail, { ...extra, errors });
}
