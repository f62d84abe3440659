import type { RequestEvent } from '@sveltejs/kit';
import { giveForm, limitsOf, refuseForm, wrongChoice } from '$lib/components/clearances/decision';
import { invalidField, type Problem } from '$lib/domain/core/errors';
import { localDateOf } from '$lib/domain/core/time';
import { m } from '$lib/i18n/paraglide/messages';
import {
	giveClearance,
	holdClearance,
	withdrawClearance,
	withholdClearance,
	type SeenDecision
} from '$lib/server/clearances/actions';
import { answerQuestion, askBack as askBackAbout } from '$lib/server/clearances/ask-back';
import type { PersonContext } from '$lib/server/context';
import { env } from '$lib/server/env';
import { formAction } from '$lib/server/http/form-action';
import { read } from '$lib/server/read';
import { leadOnWithoutScript } from '../../without-script';

/** The form actions of the decider's page. */
const words = { 'wrong-state': fasterWords, 'idempotency-mismatch': m.clearances_changed };

export const give = formAction({
	schema: giveForm,
	id: 'give',
	words,
	run: async (context, fields, event) => {
		const id = clearanceOf(event);
		const { kind } = await read.clearance(context, id);
		const { reviewOn, note, seen } = fields;
		const wrong = wrongChoice(kind, fields.limit);
		if (wrong !== null) {
			throw invalidField('/limit', wrong);
		}
		if (reviewOn !== undefined && reviewOn < localDateOf(context.now, env().hospital.zone)) {
			throw invalidField('/reviewOn', m.clearances_review_is_past());
		}
		await giveClearance(context, id, { limits: limitsOf(fields), reviewOn, note }, seen || null);
		leadOnWithoutScript(event, event.url.pathname);
		return m.clearances_given();
	}
});

type Refusal = (context: PersonContext, id: string, reason: string, seen: SeenDecision) => Promise<unknown>;

function refusing(id: string, refuse: Refusal) {
	return formAction({
		schema: refuseForm,
		id,
		words,
		run: async (context, { reason, seen }, event) => {
			await refuse(context, clearanceOf(event), reason, seen || null);
			leadOnWithoutScript(event, event.url.pathname);
			return m.clearances_done();
		}
	});
}

export const withhold = refusing('withhold', withholdClearance);
export const hold = refusing('hold', holdClearance);
export const withdraw = refusing('withdraw', withdrawClearance);

export const askBack = refusing('askBack', askBackAbout);
export const answer = refusing('answer', answerQuestion);

function clearanceOf({ params }: RequestEvent): string {
	return params.clearanceId ?? '';
}

/** Who was faster; what they decided stands on the page, which is fetched anew. */
function fasterWords({ extra }: Problem): string {
	return typeof extra.decidedBy === 'string'
		? m.clearances_faster({ name: extra.decidedBy })
		: m.clearances_changed();
}
