import { answering } from '$lib/server/http/endpoint';
import { markupResponse } from '$lib/server/messages/markup';
import { receiveStatus } from '$lib/server/messages/receive-status';
import { readSignedForm } from '$lib/server/messages/signature';
import type { RequestHandler } from './$types';

/** What became of a text that we sent. */
export const POST: RequestHandler = ({ request, url, locals }) =>
	answering(async () => {
		await receiveStatus(await readSignedForm(request, url.pathname), locals.context.now);
		return markupResponse();
	});
