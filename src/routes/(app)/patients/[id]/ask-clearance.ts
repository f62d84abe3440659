import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { limitsOf, wrongProposal } from '$lib/components/clearances/decision';
import { askForm as askSchema } from '$lib/components/clearances/decision-forms';
import { askable } from '$lib/components/clearances/standing';
import { invalidField } from '$lib/domain/core/errors';
import { localDateOf } from '$lib/domain/core/time';
import type { ClearanceLine } from '$lib/domain/episodes/views';
import { m } from '$lib/i18n/paraglide/messages';
import { askClearance } from '$lib/server/clearances/actions';
import { formAction } from '$lib/server/http/form-action';
import { idParam } from '$lib/server/http/param';
import { leadOnWithoutScript } from './without-script';

const ID = 'ask-clearance';

/** The empty ask, open at the first kind that can be asked for. */
export function askForm(
	lines: readonly ClearanceLine[],
	at: { now: number; zone: string },
	threadId?: string
) {
	const [kind] = askable(lines, localDateOf(at.now, at.zone));
	return superValidate({ kind, threadId }, zod4(askSchema), { id: ID, errors: false });
}

/** The action behind it, on every page that has the form. */
export const askClearanceAction = formAction({
	schema: askSchema,
	id: ID,
	run: async (context, fields, event) => {
		const { kind, question, threadId } = fields;
		const wrong = wrongProposal(kind, fields.limit);
		if (wrong !== null) {
			throw invalidField('/limit', wrong);
		}
		const proposed = limitsOf(fields);
		await askClearance(context, idParam(event), { kind, question, threadId, proposed });
		leadOnWithoutScript(event, event.url.pathname);
		return m.clearances_asked();
	}
});
