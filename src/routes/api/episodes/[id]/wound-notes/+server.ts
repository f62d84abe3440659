import { woundNoteBody } from '$lib/domain/wounds/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { noteWound } from '$lib/server/wounds/actions';

export const POST = writing({
	permission: 'wound.note',
	body: woundNoteBody,
	status: 201,
	run: (context, input, event) => noteWound(context, idParam(event), input)
});
