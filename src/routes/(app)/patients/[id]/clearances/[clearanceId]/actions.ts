import type { RequestEvent } from '@sveltejs/kit';
import { choicesOf, limitsOf, wrongChoice } from '$lib/components/clearances/decision';
import { giveForm, noFields, refuseForm } from '$lib/components/clearances/decision-forms';
import { invalidField, type Problem } from '$lib/domain/core/errors';
import { localDateOf } from '$lib/domain/core/time';
import { m } from '$lib/i18n/paraglide/messages';
import {
	giveClearance,
	holdClearance,
	withdrawClearance,
	withholdClearance
} from '$lib/server/clearances/actions';
import type { Seen } from '$lib/server/clearances/refuse';
import { answerQuestion, askBack as askBackAbout } from '$lib/server/clearances/ask-back';
import { acknowledgeRefusal } from '$lib/server/clearances/refusal';
import type { PersonContext } from '$lib/server/context';
import { env } from '$lib/server/env';
import { formAction } from '$lib/server/http/form-action';
import { read } from '$lib/server/read';
import { leadOnWithoutScript } from '../../without-script';

/** The form actions of the decider's page. */
const words = { 'wrong-state': fasterWords };

export const give = formAction({
	schema: giveForm,
	id: 'give',
	words,
	run: async (context, fields, event) => {
		const id = clearanceOf(event);
		const about = await read.clearance(context, id);
		const { reviewOn, note } = fields;
		const wrong = wrongChoice(about, fields);
		if (wrong !== null) {
			throw invalidField('/limit', wrong);
		}
		if (reviewOn !== undefined && reviewOn < localDateOf(context.now, env().hospital.zone)) {
			throw invalidField('/reviewOn', m.clearances_review_is_past());
		}
		// Where a limit was in question, none is one of the choices and was chosen.
		const limits = limitsOf(fields, choicesOf(about)) ?? null;
		await giveClearance(context, id, { limits, reviewOn, note }, seenOf(fields));
		leadOnWithoutScript(event, event.url.pathname);
		return m.clearances_given();
	}
});

type Refusal = (context: PersonContext, id: string, reason: string, seen: Seen) => Promise<unknown>;

function refusing(id: string, refuse: Refusal) {
	return formAction({
		schema: refuseForm,
		id,
		words,
		run: async (context, fields, event) => {
			await refuse(context, clearanceOf(event), fields.reason, seenOf(fields));
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

/** Whoever asked has seen the no. */
export const acknowledge = formAction({
	schema: noFields,
	id: 'acknowledge',
	run: async (context, _fields, event) => {
		await acknowledgeRefusal(context, clearanceOf(event));
		leadOnWithoutScript(event, event.url.pathname);
		return m.clearances_done();
	}
});

/** What the page showed when it was decided on. */
function seenOf({ seen, shown }: { seen: string; shown?: string }): Seen {
	return { decidedAt: seen || null, evidence: shown };
}

function clearanceOf({ params }: RequestEvent): string {
	return params.clearanceId ?? '';
}

/** Who was faster; what they decided stands on the page, which is fetched anew. */
function fasterWords({ extra }: Problem): string {
	return typeof extra.decidedBy === 'string'
		? m.clearances_faster({ name: extra.decidedBy })
		: m.clearances_changed();
}
