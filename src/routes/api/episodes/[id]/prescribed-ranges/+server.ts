import { prescribeRangeBody } from '$lib/domain/limits/forms';
import { reading, writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { prescribeRange } from '$lib/server/limits/range-actions';
import { read } from '$lib/server/read';

export const GET = reading({
	permission: 'session.read',
	run: async (context, event) => ({ items: await read.ranges(context, idParam(event)), next: null })
});

export const POST = writing({
	permission: 'range.prescribe',
	body: prescribeRangeBody,
	status: 201,
	run: (context, input, event) => prescribeRange(context, idParam(event), input)
});
