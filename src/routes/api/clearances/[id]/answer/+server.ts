import { answerBody } from '$lib/domain/clearances/forms';
import { answerQuestion } from '$lib/server/clearances/ask-back';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'clearance.ask',
	body: answerBody,
	run: (context, { answer }, event) => answerQuestion(context, idParam(event), answer)
});
