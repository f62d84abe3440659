import { reading } from '$lib/server/http/endpoint';
import { read } from '$lib/server/read';

/** The ways out of the product that do not work now; empty when all is well. */
export const GET = reading({ permission: 'own-account.change', run: (context) => read.delivery(context) });
