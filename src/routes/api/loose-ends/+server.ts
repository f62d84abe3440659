import { reading } from '$lib/server/http/endpoint';
import { read } from '$lib/server/read';

export const GET = reading({ permission: 'episode.read', run: (context) => read.looseEnds(context) });
