import { env } from '$lib/server/env';
import type { LayoutServerLoad } from './$types';

/** What the frame of a linked page shows, its error page included. Neither a cache nor a search engine keeps it. */
export const load: LayoutServerLoad = ({ locals, setHeaders }) => {
	setHeaders({ 'cache-control': 'no-store', 'x-robots-tag': 'noindex, nofollow, noarchive' });
	const { zone, emergency } = env().hospital;
	return { zone, emergency, now: locals.context.now };
};
