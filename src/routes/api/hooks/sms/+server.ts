import { answering } from '$lib/server/http/endpoint';
import { markupResponse } from '$lib/server/messages/markup';
import { receiveText } from '$lib/server/messages/receive-text';
import { readSignedForm } from '$lib/server/messages/signature';
import type { RequestHandler } from './$types';

/** A text that somebody sent to the hospital's number. */
export const POST: RequestHandler = ({ request, url, locals }) =>
	answering(async () => {
		await receiveText(await readSignedForm(request, url.pathname), locals.context);
		return markupResponse();
	});
