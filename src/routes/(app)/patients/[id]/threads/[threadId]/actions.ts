import type { RequestEvent } from '@sveltejs/kit';
import { z } from 'zod';
import type { Problem } from '$lib/domain/core/errors';
import { isOneOf, REFERRAL_STATES } from '$lib/domain/core/codes';
import { text } from '$lib/domain/core/fields';
import { maybeReasonForm, reasonForm } from '$lib/domain/referrals/forms';
import { REFERRAL_STATE_WORDS } from '$lib/i18n/labels';
import { m } from '$lib/i18n/paraglide/messages';
import { routes } from '$lib/routes';
import type { PersonContext } from '$lib/server/context';
import { formAction } from '$lib/server/http/form-action';
import { idParam } from '$lib/server/http/param';
import { read } from '$lib/server/read';
import {
	acceptReferral,
	closeReferral,
	declineReferral,
	withdrawReferral
} from '$lib/server/referrals/actions';
import { markSeen, postEntry } from '$lib/server/threads/actions';
import { leadOnWithoutScript } from '../../without-script';

/** The forms of a thread. They say the fields' own words where the API says their names. */
export const postForm = z.object({ body: text('Entry', 8000), mention: z.string().max(64).default('') });
export const seenForm = z.object({ mentionId: z.string().max(64).default('') });

export const post = formAction({
	schema: postForm,
	id: 'post',
	words: { 'wrong-state': () => m.referrals_entry_withdrawn_closed() },
	run: async (context, { body, mention }, event) => {
		const asked = mention === '' ? {} : { mentions: [mention] };
		const { result } = await postEntry(context, threadOf(event), { body, ...asked });
		leadOnWithoutScript(event, `${event.url.pathname}#entry-${result.seq}`);
		return m.referrals_entry_sent();
	}
});

export const seen = formAction({
	schema: seenForm,
	id: 'seen',
	run: async (context, { mentionId }, event) => {
		await markSeen(context, mentionId);
		leadOnWithoutScript(event, event.url.pathname);
		return m.referrals_seen();
	}
});

type Reason = { reason?: string };
type Move = (context: PersonContext, referralId: string, fields: Reason) => Promise<unknown>;

/** One move of the referral behind the thread; the page knows the thread, the move wants its referral. */
function moving(id: string, schema: z.ZodType<Reason, Reason>, done: () => string, move: Move) {
	return formAction({
		schema,
		id,
		words: { 'wrong-state': stateWords },
		run: async (context, fields, event) => {
			const { referral } = await read.thread(context, threadOf(event), { limit: 1, after: null });
			await move(context, referral.id, fields);
			leadOnWithoutScript(event, routes.thread(idParam(event), threadOf(event)));
			return done();
		}
	});
}

export const accept = moving('accept', maybeReasonForm, m.referrals_accepted, (context, id) =>
	acceptReferral(context, id)
);
export const decline = moving('decline', reasonForm, m.referrals_declined, (context, id, fields) =>
	declineReferral(context, id, fields.reason ?? '')
);
export const close = moving('close', maybeReasonForm, m.referrals_closed, (context, id, fields) =>
	closeReferral(context, id, fields.reason ?? null)
);
export const withdraw = moving('withdraw', reasonForm, m.referrals_withdrawn, (context, id, fields) =>
	withdrawReferral(context, id, fields.reason ?? '')
);

function threadOf({ params }: RequestEvent): string {
	return params.threadId ?? '';
}

/** Somebody was faster: say how it stands now. */
function stateWords({ extra, detail }: Problem): string {
	const state = String(extra.state);
	return isOneOf(REFERRAL_STATES, state)
		? m.referrals_state_meanwhile({ state: REFERRAL_STATE_WORDS[state]().toLowerCase() })
		: detail;
}
