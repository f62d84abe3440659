import { answering } from '$lib/server/http/endpoint';
import { markupResponse } from '$lib/server/messages/markup';
import { readSignedForm } from '$lib/server/messages/signature';
import { takeByCall } from '$lib/server/messages/take-by-call';
import type { RequestHandler } from './$types';

/** A digit that was pressed in a telephone call of ours. The signature covers which message the call was. */
export const POST: RequestHandler = ({ request, url, locals }) =>
	answering(async () => {
		const form = await readSignedForm(request, url.pathname + url.search);
		return markupResponse(await takeByCall(form, url.searchParams.get('message') ?? '', locals.context));
	});
