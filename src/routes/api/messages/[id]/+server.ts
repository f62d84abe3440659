import { reading } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { getStory } from '$lib/server/messages/story';

/** One message's whole story. */
export const GET = reading({
	permission: 'message-log.read',
	run: (context, event) => getStory(context, idParam(event))
});
