import type { RequestHandler } from './$types';
import { requirePerson } from '$lib/server/context';
import { answering } from '$lib/server/http/endpoint';
import { resumePoint } from '$lib/server/live/resume';
import { openStream } from '$lib/server/live/stream';

export const GET: RequestHandler = ({ locals, request, url }) =>
	answering(async () => {
		const { actor } = requirePerson(locals.context);
		const after = resumePoint(request.headers, url);
		return openStream(actor, locals.credentialStillGood, after, { beats: url.searchParams.has('beats') });
	});
