import type { RequestEvent } from '@sveltejs/kit';
import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { maybeReasonForm, reasonForm } from '$lib/domain/referrals/forms';
import { notFound } from '$lib/domain/core/errors';
import type { ThreadView } from '$lib/domain/referrals/views';
import type { PersonContext } from '$lib/server/context';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { idParam } from '$lib/server/http/param';
import { read } from '$lib/server/read';
import { askClearanceAction, askForm } from '../../ask-clearance';
import { accept, close, decline, post, postForm, seen, seenForm, withdraw } from './actions';
import type { Actions, PageServerLoad } from './$types';

const PAGE = 200;

export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const { threadId } = event.params;
		const [thread, people, { nameboard, zone, now }] = await Promise.all([
			wholeThread(context, threadId, event),
			read.colleagues(context, idParam(event)),
			event.parent()
		]);
		return {
			thread,
			threadId,
			people,
			forms: {
				post: await superValidate(zod4(postForm), { id: 'post' }),
				seen: await superValidate(zod4(seenForm), { id: 'seen' }),
				accept: await superValidate(zod4(maybeReasonForm), { id: 'accept' }),
				decline: await superValidate(zod4(reasonForm), { id: 'decline' }),
				close: await superValidate(zod4(maybeReasonForm), { id: 'close' }),
				withdraw: await superValidate(zod4(reasonForm), { id: 'withdraw' }),
				ask: await askForm(nameboard.clearances, { now, zone }, threadId)
			},
			keys: {
				post: newFormKey(),
				seen: newFormKey(),
				accept: newFormKey(),
				decline: newFormKey(),
				close: newFormKey(),
				withdraw: newFormKey(),
				ask: newFormKey()
			}
		};
	});

export const actions: Actions = { post, seen, accept, decline, close, withdraw, ask: askClearanceAction };

/** A thread with all its entries; one of another patient is not there. */
async function wholeThread(context: PersonContext, id: string, event: RequestEvent): Promise<ThreadView> {
	let view = await read.thread(context, id, { limit: PAGE, after: null });
	if (view.referral.episodeId !== idParam(event)) {
		throw notFound('thread');
	}
	while (view.next !== null) {
		const more = await read.thread(context, id, { limit: PAGE, after: view.next });
		view = { ...more, items: [...view.items, ...more.items] };
	}
	return view;
}
