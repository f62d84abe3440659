import type { RequestEvent } from '@sveltejs/kit';
import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { Problem } from '$lib/domain/core/errors';
import { localDateOf } from '$lib/domain/core/time';
import { wordActivityBody } from '$lib/domain/limits/forms';
import { resetActivityForm, wordActivityForm, type WordActivityFields } from '$lib/domain/limits/page-forms';
import { fieldsOfLines, linesOfFields } from '$lib/domain/limits/wording';
import { m } from '$lib/i18n/paraglide/messages';
import { listAccounts } from '$lib/server/accounts/list';
import { env } from '$lib/server/env';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { invalidBody } from '$lib/server/http/problem';
import { wordActivity } from '$lib/server/limits/activity-actions';
import { read } from '$lib/server/read';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const { units } = await listAccounts(context);
		const unitId = unitOf(event) || units[0]?.id || null;
		const activities = await read.activities(unitId);
		const asked = event.url.searchParams.get('activity');
		const activity = activities.find(({ code }) => code === asked) ?? activities[0];
		if (!activity) {
			throw new Problem('not-found');
		}
		const agreed = { agreedBy: '', agreedOn: localDateOf(context.now, env().hospital.zone) };
		const fields: WordActivityFields = { code: activity.code, ...fieldsOfLines(activity), ...agreed };
		return {
			allUnits: units.map(({ id, name }) => ({ id, name })),
			unitId,
			activities,
			activity,
			word: await superValidate(fields, zod4(wordActivityForm), { id: 'word', errors: false }),
			reset: await superValidate({ code: activity.code, ...agreed }, zod4(resetActivityForm), {
				id: 'reset',
				errors: false
			}),
			keys: { word: newFormKey(), reset: newFormKey() }
		};
	});

export const actions: Actions = {
	word: formAction({
		id: 'word',
		schema: wordActivityForm,
		async run(context, { code, agreedBy, agreedOn, ...fields }, event) {
			const body = wordActivityBody.safeParse({ code, lines: linesOfFields(fields), agreedBy, agreedOn });
			if (!body.success) {
				throw invalidBody(body.error);
			}
			const { result } = await wordActivity(context, unitOf(event), body.data);
			return m.limits_changed({ version: result.version });
		}
	}),
	reset: formAction({
		id: 'reset',
		schema: resetActivityForm,
		async run(context, fields, event) {
			const { result } = await wordActivity(context, unitOf(event), { ...fields, lines: null });
			return m.limits_changed({ version: result.version });
		}
	})
};

function unitOf({ url }: Pick<RequestEvent, 'url'>): string {
	return url.searchParams.get('unit') ?? '';
}
