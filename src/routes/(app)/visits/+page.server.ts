import { can } from '$lib/domain/access/can';
import { isLocalDate, localDateOf } from '$lib/domain/core/time';
import { mondayOf, visitRange } from '$lib/domain/visits/range';
import { requirePermission } from '$lib/server/access/require';
import type { PersonContext } from '$lib/server/context';
import { env } from '$lib/server/env';
import { MAX_LIMIT } from '$lib/server/http/paging';
import { pageLoad } from '$lib/server/http/page';
import { read } from '$lib/server/read';
import { listClosedDays } from '$lib/server/visits/closed-days';
import { listVisits } from '$lib/server/visits/queries';
import type { PageServerLoad } from './$types';

const ALL = { limit: MAX_LIMIT, after: null };

/** The visits of the week that holds `?from=`, as `?view=week` or `list`; this week where left out. */
export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		requirePermission(context.actor, 'visit.read');
		const { zone } = env().hospital;
		const { searchParams } = event.url;
		const asked = searchParams.get('from') ?? '';
		const from = mondayOf(isLocalDate(asked) ? asked : localDateOf(context.now, zone));
		const range = visitRange(from, null, zone, context.now);
		const [visits, closed, patients] = await Promise.all([
			listVisits(context.actor, range, ALL),
			listClosedDays(from),
			can(context.actor, 'visit.plan') ? patientsToBook(context) : []
		]);
		const view = searchParams.get('view') === 'list' ? ('list' as const) : ('week' as const);
		return { from, view, visits, closed, patients };
	});

/** No more than what tells patients apart in a list. */
async function patientsToBook(context: PersonContext) {
	const { items } = await read.episodes(context, null, ALL);
	return items.map(({ id, patient, unit, bed }) => ({
		id,
		name: patient.name,
		birthDate: patient.birthDate,
		place: [unit, bed].filter(Boolean).join(' ')
	}));
}
