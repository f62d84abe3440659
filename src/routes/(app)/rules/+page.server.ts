import { limitsFor } from '$lib/domain/bedside/limits/limits';
import { SOURCES } from '$lib/domain/bedside/limits/sources';
import { rulebook } from '$lib/domain/bedside/rulebook';
import type { PageServerLoad } from './$types';

/** The rules as they judge, with their default limits. Nothing here is about a patient. */
export const load: PageServerLoad = () => ({
	rulebook: rulebook(),
	cautionFrom: limitsFor('strict').cautionShare ?? 1,
	sources: Object.entries(SOURCES).map(([id, source]) => ({ id, ...source }))
});
