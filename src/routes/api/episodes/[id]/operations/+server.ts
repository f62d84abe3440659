import { recordOperationBody } from '$lib/domain/episodes/operation';
import { recordOperation } from '$lib/server/episodes/operation';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'operation.record',
	body: recordOperationBody,
	status: 201,
	run: (context, input, event) => recordOperation(context, idParam(event), input)
});
