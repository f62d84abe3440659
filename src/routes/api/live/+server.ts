import type { RequestHandler } from './$types';
import { requirePerson } from '$lib/server/context';
import { answering } from '$lib/server/http/endpoint';
import { resumePoint } from '$lib/server/live/resume';
import { openStream } from '$lib/server/live/stream';

export const GET: RequestHandler = ({ locals, platform, request, url }) =>
	answering(async () => {
		const { actor } = requirePerson(locals.context);
		return openStream({
			person: actor,
			stillGood: locals.credentialStillGood,
			after: resumePoint(request.headers, url),
			beats: url.searchParams.has('beats'),
			// Who does not read does not see an end either: what waits in the socket stands before it.
			cutOff: () => platform?.req?.socket.resetAndDestroy()
		});
	});
