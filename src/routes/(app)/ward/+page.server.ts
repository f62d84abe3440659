import { notFound } from '$lib/domain/core/errors';
import { requirePermission } from '$lib/server/access/require';
import { MAX_LIMIT } from '$lib/server/http/paging';
import { pageLoad } from '$lib/server/http/page';
import { read } from '$lib/server/read';
import type { PageServerLoad } from './$types';

/** The patients of `?unit=`, or of all units of the person. */
export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		requirePermission(context.actor, 'episode.read');
		const unitId = event.url.searchParams.get('unit') || null;
		if (unitId !== null && !context.actor.unitIds.includes(unitId)) {
			throw notFound('unit');
		}
		const episodes = await read.episodes(context, unitId, { limit: MAX_LIMIT, after: null });
		return { unitId, episodes };
	});
