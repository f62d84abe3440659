import type { RequestHandler } from './$types';
import { Problem } from '$lib/domain/core/errors';
import { requirePerson } from '$lib/server/context';
import { answering } from '$lib/server/http/endpoint';
import { dropConnection } from '$lib/server/live/connection';
import { resumePoint } from '$lib/server/live/resume';
import { openStream } from '$lib/server/live/stream';

export const GET: RequestHandler = ({ locals, platform, request, url }) =>
	answering(async () => {
		const { actor } = requirePerson(locals.context);
		const meant = url.searchParams.get('as');
		// A page of who was signed in before would hear what concerns who is now.
		if (meant !== null && meant !== actor.id) {
			throw new Problem('not-signed-in', 'Somebody else is signed in in this browser by now.');
		}
		return openStream({
			person: actor,
			stillGood: locals.credentialStillGood,
			after: resumePoint(request.headers, url),
			beats: url.searchParams.has('beats'),
			dropConnection: () => dropConnection(platform?.req)
		});
	});
