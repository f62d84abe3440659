import { assess } from '$lib/domain/bedside/assess';
import { assessBody } from '$lib/domain/bedside/forms';
import { writing } from '$lib/server/http/endpoint';

/** The response rules on readings that are not stored. */
export const POST = writing({
	permission: 'own-account.change',
	body: assessBody,
	run: (_context, input) => Promise.resolve({ result: assess(input), replayed: false })
});
