import { SETS } from '$lib/domain/bedside/codes';
import { limitsOfUnit } from '$lib/domain/bedside/limits/layers';
import { SOURCES } from '$lib/domain/bedside/limits/sources';
import { rulebook } from '$lib/domain/bedside/rulebook';
import { pageLoad } from '$lib/server/http/page';
import { read } from '$lib/server/read';
import type { PageServerLoad } from './$types';

/** The rules as they judge: by their defaults, or with `?unit=` by what that unit made of them. About no patient. */
export const load: PageServerLoad = (event) =>
	pageLoad(event, async () => {
		const unitId = event.url.searchParams.get('unit');
		const local = unitId ? await read.unitLimits(unitId) : null;
		const changes = local?.changes ?? [];
		const sets = Object.fromEntries(SETS.map((set) => [set, limitsOfUnit(set, changes)]));
		return {
			rulebook: rulebook(sets),
			judged: local && { unit: local.unit, inpatientSet: local.inpatientSet },
			activities: await read.activities(unitId),
			sources: Object.entries(SOURCES).map(([id, source]) => ({ id, ...source }))
		};
	});
