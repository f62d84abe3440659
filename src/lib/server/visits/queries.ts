import { and, asc, eq, gte, inArray, lt, sql } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { invalidField } from '$lib/domain/core/errors';
import type { BoardVisit } from '$lib/domain/episodes/views';
import { RangeProblem, visitRange, type VisitRange } from '$lib/domain/visits/range';
import type { VisitItem } from '$lib/domain/visits/views';
import { accessEpisode } from '../access/access';
import { db, type Reader } from '../db';
import { episodes, patients, visits } from '../db/schema';
import { env } from '../env';
import { MAX_LIMIT, page, type Page, type PageRequest } from '../http/paging';
import { closedNames } from './closed-days';
import { visitItems, visitLine } from './items';

/** The visits of one episode, oldest first, for the nameboard. The caller has checked the access. */
export async function visitsOfEpisode(reader: Reader, episodeId: string): Promise<BoardVisit[]> {
	const rows = await reader
		.select()
		.from(visits)
		.where(eq(visits.episodeId, episodeId))
		.orderBy(asc(visits.startsAt), asc(visits.id));
	const closed = await closedNames(reader, rows);
	return rows.map((row) => ({ ...visitLine(row), closedDay: closed.get(row.id) ?? null }));
}

/**
 * `?from=&to=` of the list of visits, each a day or an instant; this week where left out.
 * @throws Problem `invalid` naming the bound
 */
export function visitRangeOf(url: URL, now: number): VisitRange {
	const { searchParams } = url;
	try {
		return visitRange(searchParams.get('from'), searchParams.get('to'), env().hospital.zone, now);
	} catch (error) {
		if (error instanceof RangeProblem) {
			throw invalidField(`/${error.field}`, error.message);
		}
		throw error;
	}
}

const ALL: PageRequest = { limit: MAX_LIMIT, after: null };

/**
 * The visits of patients in the person's units that begin within the range, oldest first, with the patient and
 * what became of the reminders.
 */
export async function listVisits(
	person: Person,
	range: VisitRange,
	request: PageRequest = ALL
): Promise<Page<VisitItem>> {
	const unitIds = person.unitIds.filter((unitId) => can(person, 'visit.read', { unitId }));
	const after = request.after === null ? undefined : await afterVisit(request.after);
	const rows = await db()
		.select({ visit: visits, patient: patients })
		.from(visits)
		.innerJoin(episodes, eq(episodes.id, visits.episodeId))
		.innerJoin(patients, eq(patients.id, episodes.patientId))
		.where(
			and(
				inArray(episodes.unitId, unitIds),
				gte(visits.startsAt, range.from),
				lt(visits.startsAt, range.to),
				after
			)
		)
		.orderBy(asc(visits.startsAt), asc(visits.id))
		.limit(request.limit + 1);
	const { items, next } = page(rows, request, ({ visit }) => visit.id);
	return { items: await visitItems(items), next };
}

/**
 * All visits of one episode, oldest first, as the list has them.
 * @throws Problem `not-found` outside the person's units
 */
export async function visitItemsOf(person: Person, episodeId: string): Promise<Page<VisitItem>> {
	const episode = await accessEpisode(db(), person, episodeId, 'visit.read');
	const rows = await db()
		.select({ visit: visits, patient: patients })
		.from(visits)
		.innerJoin(patients, eq(patients.id, episode.patientId))
		.where(eq(visits.episodeId, episodeId))
		.orderBy(asc(visits.startsAt), asc(visits.id));
	return { items: await visitItems(rows), next: null };
}

async function afterVisit(id: string) {
	const [row] = await db().select({ startsAt: visits.startsAt }).from(visits).where(eq(visits.id, id));
	if (!row) {
		throw invalidField('/after', `after is '${id.slice(0, 40)}': it must be the next of an earlier answer.`);
	}
	return sql`(${visits.startsAt}, ${visits.id}) > (${row.startsAt}, ${id})`;
}
