import { answering } from '$lib/server/http/endpoint';
import { markupResponse } from '$lib/server/messages/markup';
import { OF_CALL, receiveStatus } from '$lib/server/messages/receive-status';
import { readSignedForm } from '$lib/server/messages/signature';
import type { RequestHandler } from './$types';

/** What became of a telephone call that we made. */
export const POST: RequestHandler = ({ request, url, locals }) =>
	answering(async () => {
		await receiveStatus(await readSignedForm(request, url.pathname), locals.context.now, OF_CALL);
		return markupResponse();
	});
