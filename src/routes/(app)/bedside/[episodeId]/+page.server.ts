import { can } from '$lib/domain/access/can';
import { Problem } from '$lib/domain/core/errors';
import { m } from '$lib/i18n/paraglide/messages';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { read } from '$lib/server/read';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const board = await read.nameboard(context, event.params.episodeId);
		if (!can(context.actor, 'session.record', { unitId: board.unitId })) {
			throw new Problem('not-allowed', m.bedside_not_allowed());
		}
		return { board, key: newFormKey(), unitId: board.unitId };
	});
