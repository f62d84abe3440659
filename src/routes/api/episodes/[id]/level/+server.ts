import { decideLevelBody } from '$lib/domain/levels/forms';
import { reading, writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { decideLevel } from '$lib/server/levels/actions';
import { read } from '$lib/server/read';

export const GET = reading({
	permission: 'session.read',
	run: (context, event) => read.level(context, idParam(event))
});

export const POST = writing({
	permission: 'level.decide',
	body: decideLevelBody,
	run: (context, input, event) => decideLevel(context, idParam(event), input)
});
