import { error, fail, redirect, type RequestEvent } from '@sveltejs/kit';
import { Problem } from '$lib/domain/core/errors';
import { pageDeed, type PageDeed } from '$lib/domain/patient-page/forms';
import { routes } from '$lib/routes';
import { newFormKey, orErrorPage, withFormKey } from '$lib/server/http/page';
import { answerOnPage, readPage } from '$lib/server/patient-page/link';
import type { Actions, PageServerLoad } from './$types';

/** Looking changes nothing: previews of messages, virus scanners and curious thumbs only read. */
export const load: PageServerLoad = ({ locals, params }) =>
	orErrorPage(async () => ({ page: await readPage(locals.context, params.token), key: newFormKey() }));

export const actions: Actions = {
	/** The patient will come, or cannot. Sent twice it is done once. */
	default: async (event) => {
		const { locals, params, request } = event;
		const posted = Object.fromEntries(await request.formData());
		const deed = pageDeed.safeParse(posted);
		if (!deed.success) {
			const [visit, why] = [posted.visit, posted.why].map((typed) =>
				typeof typed === 'string' ? typed : ''
			);
			return fail(422, { refused: 'invalid', visit, why });
		}
		try {
			const { key } = deed.data;
			const context = key ? withFormKey(locals.context, event, key, deed.data) : locals.context;
			await answerOnPage(context, params.token, deed.data);
		} catch (thrown) {
			return refused(thrown, event, params.token, deed.data);
		}
		redirect(303, routes.patientPage(params.token));
	}
};

const WANTED = { confirm: 'confirmed', decline: 'cancelled' } as const;

/** What is already as the patient wants it is no refusal. */
function refused(thrown: unknown, { url }: RequestEvent, token: string, { deed, visit, why }: PageDeed) {
	if (!(thrown instanceof Problem)) {
		throw thrown;
	}
	if (thrown.extra.state === WANTED[deed] || thrown.code === 'in-flight') {
		redirect(303, routes.patientPage(token) + url.hash);
	}
	if (thrown.status === 404 || thrown.status === 410) {
		error(thrown.status, { message: thrown.detail, code: thrown.code });
	}
	return fail(thrown.status, { refused: thrown.code, visit, why });
}
