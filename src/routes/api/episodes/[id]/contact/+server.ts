import { contactBody } from '$lib/domain/episodes/operation';
import { amendContact } from '$lib/server/episodes/patient';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';

export const POST = writing({
	permission: 'contact.amend',
	body: contactBody,
	run: (context, input, event) => amendContact(context, idParam(event), input)
});
