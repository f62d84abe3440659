import { closeBody } from '$lib/domain/episodes/forms';
import { closeEpisode } from '$lib/server/episodes/close';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'episode.close',
	body: closeBody,
	run: (context, { reason }, event) => closeEpisode(context, idParam(event), reason)
});
