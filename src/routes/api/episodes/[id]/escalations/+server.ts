import { raiseBody } from '$lib/domain/escalations/forms';
import { raiseEscalation, type Raised } from '$lib/server/escalations/raise';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'escalation.raise',
	body: raiseBody,
	// New facts for one that is still untaken are an addition, not a second escalation.
	status: (result: Raised) => (result.bundled ? 200 : 201),
	run: (context, input, event) => raiseEscalation(context, idParam(event), input)
});
