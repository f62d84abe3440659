import { askBackBody } from '$lib/domain/clearances/forms';
import { askBack } from '$lib/server/clearances/ask-back';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'clearance.decide',
	body: askBackBody,
	run: (context, { question }, event) => askBack(context, idParam(event), question)
});
