import { and, asc, eq, inArray, isNull, sql } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { toRfc3339 } from '$lib/domain/core/instant';
import { isSoughtAnew } from '$lib/domain/escalations/holding';
import { notKnown } from '$lib/domain/episodes/may-do-now';
import type { EpisodeListItem } from '$lib/domain/episodes/views';
import { hangingEnds } from '$lib/domain/loose-ends/hanging';
import type { Reader } from '../db';
import { episodes, escalations, patients, units, users } from '../db/schema';
import { page, type Page, type PageRequest } from '../http/paging';
import { linesInOf, oxygenOf } from '../lines/queries';
import { openThings } from '../loose-ends/queries';
import { factsOf, levelsDecide } from './facts';

/** Who lies in a bed before who only comes for visits, and beds in the order in which people read them: T2 before T10. */
const ORDER = sql`(${episodes.bed} is null, ${units.name}, length(coalesce(${episodes.bed}, '')), coalesce(${episodes.bed}, ''), ${episodes.id})`;

/**
 * The patients of a person's units, by unit and bed.
 * @param unit id or exact name; null for all of the person's units
 */
export async function listEpisodes(
	db: Reader,
	person: Person,
	now: number,
	unit: string | null,
	request: PageRequest
): Promise<Page<EpisodeListItem>> {
	const rows = await db
		.select({ episode: episodes, patient: patients, unit: units })
		.from(episodes)
		.innerJoin(patients, eq(patients.id, episodes.patientId))
		.innerJoin(units, eq(units.id, episodes.unitId))
		.where(
			and(
				inArray(episodes.unitId, [...person.unitIds]),
				isNull(episodes.closedAt),
				unit === null ? undefined : sql`${unit} in (${units.id}, ${units.name})`,
				request.after === null ? undefined : sql`${ORDER} > (${placeOf(request.after)})`
			)
		)
		.orderBy(
			sql`${episodes.bed} is null`,
			asc(units.name),
			sql`length(coalesce(${episodes.bed}, ''))`,
			sql`coalesce(${episodes.bed}, '')`,
			asc(episodes.id)
		)
		.limit(request.limit + 1);
	const { items, next } = page(rows, request, (row) => row.episode.id);
	const ids = items.map((row) => row.episode.id);
	const [facts, things, calls, linesIn, oxygen] = await Promise.all([
		factsOf(
			db,
			items.map((row) => row.episode),
			now
		),
		openThings(db, person.unitIds, now),
		openEscalations(db, ids),
		linesInOf(db, ids),
		oxygenOf(db, ids)
	]);
	const ends = hangingEnds(things, can(person, 'escalation.read'));
	const lines = items.map(({ episode, patient, unit: at }) => {
		const derived = facts.get(episode.id);
		const operation = derived?.operation ?? null;
		const said = oxygen.get(episode.id);
		// What is in the patient and what they breathe is as much a clinical record here as on their own page.
		const maySee = can(person, 'session.read', { unitId: at.id });
		return {
			id: episode.id,
			patient: patientLine(patient),
			unit: at.name,
			unitId: at.id,
			bed: episode.bed,
			procedure: operation?.procedure ?? null,
			operatedAt: operation && toRfc3339(operation.operatedAt),
			postOpDay: derived?.postOpDay ?? null,
			level: episode.level,
			betaBlocked: episode.betaBlocked,
			looseEnds: ends.get(episode.id)?.length ?? 0,
			ends: ends.get(episode.id) ?? [],
			phase: episode.phase,
			mayDoNow: derived && levelsDecide(episode, derived) ? derived.mayDoNow : null,
			notKnown: derived ? notKnown({ ...episode, precautions: derived.precautions }) : [],
			precautions: derived?.precautions,
			nothingByMouth: episode.phase === 'inpatient' && derived?.nothingByMouth === true,
			lines: maySee ? (linesIn.get(episode.id) ?? []) : [],
			oxygen: maySee && said ? { lpm: said.lpm, at: said.at } : null,
			// Who may not read calls for help sees none here either.
			escalation: can(person, 'escalation.read', { unitId: at.id }) ? (calls.get(episode.id) ?? null) : null
		} as EpisodeListItem;
	});
	return { items: lines, next };
}

export function patientLine(row: typeof patients.$inferSelect) {
	return { id: row.id, name: row.name, mrn: row.mrn, birthDate: row.birthDate, sex: row.sex };
}

/** Where the cursor's episode stands in the order; unknown cursors end the list. */
function placeOf(episodeId: string) {
	return sql`select ce.bed is null, cu.name, length(coalesce(ce.bed, '')), coalesce(ce.bed, ''), ce.id
		from episodes ce join units cu on cu.id = ce.unit_id where ce.id = ${episodeId}`;
}

/** The most urgent escalation of each episode that is not ended. */
async function openEscalations(db: Reader, ids: string[]) {
	const rows = await db
		.select({
			episodeId: escalations.episodeId,
			id: escalations.id,
			grade: escalations.grade,
			state: escalations.state,
			takenBy: users.name,
			nextStepAt: escalations.nextStepAt
		})
		.from(escalations)
		.leftJoin(users, eq(users.id, escalations.takenBy))
		.where(and(inArray(escalations.episodeId, ids), inArray(escalations.state, ['raised', 'taken'])))
		.orderBy(
			sql`case ${escalations.state} when 'raised' then 0 else 1 end`,
			sql`case ${escalations.grade} when 'high' then 0 when 'medium' then 1 else 2 end`
		);
	const found = new Map<string, EpisodeListItem['escalation']>();
	for (const { episodeId, id, grade, state, takenBy, nextStepAt } of rows) {
		if (!found.has(episodeId)) {
			found.set(episodeId, {
				id,
				grade,
				state: state === 'taken' ? 'taken' : 'raised',
				takenBy,
				notThere: isSoughtAnew({ state, nextStepAt })
			});
		}
	}
	return found;
}
