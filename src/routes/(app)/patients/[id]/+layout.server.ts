import { idParam } from '$lib/server/http/param';
import { pageLoad } from '$lib/server/http/page';
import { read } from '$lib/server/read';
import type { LayoutServerLoad } from './$types';

/** The nameboard, for every page of the patient. */
export const load: LayoutServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const nameboard = await read.nameboard(context, idParam(event));
		return { nameboard, unitId: nameboard.unitId };
	});
