import { meOf } from '$lib/server/accounts/me';
import { reading } from '$lib/server/http/endpoint';

export const GET = reading({ permission: 'own-account.change', run: (context) => meOf(context.actor) });
