import { moveBody } from '$lib/domain/episodes/forms';
import { movePatient } from '$lib/server/episodes/move';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'episode.move',
	body: moveBody,
	run: (context, input, event) => movePatient(context, idParam(event), input)
});
