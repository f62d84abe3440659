import { reading } from '$lib/server/http/endpoint';
import { read } from '$lib/server/read';

/** The catalogue with level, energy band, dose and clearance of each; with `?unit=` in the words of that unit. */
export const GET = reading({
	permission: 'own-account.change',
	run: async (_context, { url }) => ({
		items: await read.activities(url.searchParams.get('unit')),
		next: null
	})
});
