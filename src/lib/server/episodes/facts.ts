import { and, asc, desc, eq, inArray, sql } from 'drizzle-orm';
import { limitsOfPatient, NO_LAYERS, setOfUnit, type LocalLayers } from '$lib/domain/bedside/limits/layers';
import type { Level } from '$lib/domain/core/codes';
import { localDateOf } from '$lib/domain/core/time';
import { standingDuring } from '$lib/domain/clearances/replay';
import { isInForce, stateOn } from '$lib/domain/clearances/states';
import { nothingByMouth } from '$lib/domain/episodes/by-mouth';
import { mayDoNow, type MayDoNow } from '$lib/domain/episodes/may-do-now';
import { postOperativeDay } from '$lib/domain/episodes/post-operative-day';
import { precautionsOf, type Precautions } from '$lib/domain/episodes/precautions';
import { notInError } from '../bedside/queries';
import type { Reader } from '../db';
import { bedsideSessions, clearanceMoves, clearances, operations } from '../db/schema';
import { env } from '../env';
import { layersOfMany } from '../limits/queries';

export type Operation = typeof operations.$inferSelect;
export type Clearance = typeof clearances.$inferSelect;

/** What is derived about an episode from its operations and clearances. */
export interface EpisodeFacts {
	/** The latest operation: day, precautions and clearances count from it. */
	operation: Operation | null;
	postOpDay: number | null;
	/** The newest clearance of each kind that counts from the latest operation, each in its state of now. */
	newest: Clearance[];
	inForce: Clearance[];
	mayDoNow: MayDoNow;
	/** Whether nothing may be taken by mouth, as long as the patient is in hospital. */
	nothingByMouth: boolean;
	precautions: Precautions;
}

/**
 * Whether the levels of the ward say what a patient may do now. They count from the operation, and end with the
 * stay; where no operation is on record the level is all that is known, and it is cautious.
 */
export function levelsDecide({ phase }: { phase: 'inpatient' | 'outpatient' }, facts: EpisodeFacts): boolean {
	return phase === 'inpatient' && facts.precautions.basis !== 'planned';
}

/** What the facts of an episode are derived from, beside its operations and clearances. */
type Stay = { id: string; level: number; unitId: string; phase: 'inpatient' | 'outpatient' };

/** Derive the facts of several episodes, with a few queries for all of them. */
export async function factsOf(
	db: Reader,
	episodes: readonly Stay[],
	now: number
): Promise<Map<string, EpisodeFacts>> {
	const ids = episodes.map((episode) => episode.id);
	const [allOperations, allClearances, tubed, layers] = await Promise.all([
		db
			.select()
			.from(operations)
			.where(inArray(operations.episodeId, ids))
			.orderBy(desc(operations.operatedAt)),
		db.select().from(clearances).where(inArray(clearances.episodeId, ids)).orderBy(desc(clearances.askedAt)),
		tubedOf(db, ids),
		layersOfMany(db, episodes, now)
	]);
	return new Map(
		episodes.map((episode) => [
			episode.id,
			derive(
				episode,
				allOperations.filter((row) => row.episodeId === episode.id),
				allClearances.filter((row) => row.episodeId === episode.id),
				now,
				tubed.filter((row) => row.episodeId === episode.id),
				layers.get(episode.id)
			)
		])
	);
}

/** The facts of one episode. */
export async function factsOfOne(db: Reader, episode: Stay, now: number): Promise<EpisodeFacts> {
	const facts = (await factsOf(db, [episode], now)).get(episode.id);
	if (!facts) {
		throw new Error(`No facts were derived of episode ${episode.id}.`);
	}
	return facts;
}

/**
 * The facts of one episode as they were while something was done, replayed from the moves of its clearances. The
 * operation, and the day from which a review date is past, are those of the beginning.
 */
export async function factsDuring(
	db: Reader,
	episode: Stay,
	span: { startedAt: number; endedAt: number }
): Promise<EpisodeFacts> {
	const [performed, rows, moves] = await Promise.all([
		db
			.select()
			.from(operations)
			.where(eq(operations.episodeId, episode.id))
			.orderBy(desc(operations.operatedAt)),
		db
			.select()
			.from(clearances)
			.where(eq(clearances.episodeId, episode.id))
			.orderBy(desc(clearances.askedAt), desc(clearances.id)),
		movesOf(db, episode.id)
	]);
	const day = localDateOf(span.startedAt, env().hospital.zone);
	const asTheyWere = rows.flatMap((row) => {
		const own = moves.filter((move) => move.clearanceId === row.id);
		const standing = standingDuring(own, span, day);
		if (standing === null) {
			return [];
		}
		const { takenBack, ...stood } = standing;
		return [{ ...row, ...stood, decidedBy: takenBack ? null : row.decidedBy }];
	});
	return derive(episode, performed, asTheyWere, span.startedAt);
}

/** After which operations a session found the airway held open by a tube. */
function tubedOf(db: Reader, episodeIds: string[]) {
	return db
		.selectDistinct({ episodeId: bedsideSessions.episodeId, operationId: bedsideSessions.operationId })
		.from(bedsideSessions)
		.where(
			and(
				inArray(bedsideSessions.episodeId, episodeIds),
				notInError(),
				sql`json_extract(${bedsideSessions.context}, '$.airway') in ('tube', 'tracheostomy')`
			)
		);
}

function movesOf(db: Reader, episodeId: string) {
	return db
		.select({
			clearanceId: clearanceMoves.clearanceId,
			at: clearanceMoves.at,
			fromState: clearanceMoves.fromState,
			toState: clearanceMoves.toState,
			limits: clearanceMoves.limits,
			reviewOn: clearanceMoves.reviewOn
		})
		.from(clearanceMoves)
		.innerJoin(clearances, eq(clearances.id, clearanceMoves.clearanceId))
		.where(eq(clearances.episodeId, episodeId))
		.orderBy(asc(clearanceMoves.at), asc(clearanceMoves.id));
}

function derive(
	episode: Stay,
	newestFirst: Operation[],
	asked: Clearance[],
	now: number,
	tubed: { operationId: string | null }[] = [],
	layers: LocalLayers = NO_LAYERS
): EpisodeFacts {
	const { zone } = env().hospital;
	const operation = newestFirst.find((row) => row.operatedAt <= now) ?? newestFirst.at(-1) ?? null;
	const takenBack = (row: Clearance) => row.state === 'withdrawn' && row.decidedBy === null;
	const counting = asked.filter(
		(row) => (row.operationId === null || row.operationId === operation?.id) && !takenBack(row)
	);
	const today = localDateOf(now, zone);
	const newest = newestOfKind(counting).map((row) => ({ ...row, state: stateOn(row, today) }));
	// Asking again opens no door: until it is decided anew, the last decision stands.
	const decided = newestOfKind(counting.filter((row) => row.state !== 'asked'));
	const inForce = newest.filter((row) => isInForce(row, today));
	const byMouth = newest.find((row) => row.kind === 'oral-intake');
	const armStage = inForce.find((row) => row.kind === 'arm-stage');
	return {
		operation,
		postOpDay: postOperativeDay(
			newestFirst.map((row) => row.operatedAt),
			now,
			zone
		),
		newest,
		inForce,
		mayDoNow: mayDoNow(
			episode.level as Level,
			decided.map((row) => ({ ...row, state: stateOn(row, today) }))
		),
		nothingByMouth: nothingByMouth(
			byMouth?.state ?? null,
			tubed.some((row) => row.operationId === (operation?.id ?? null))
		),
		precautions: precautionsOf(
			operation && {
				approach: operation.approach,
				day: localDateOf(operation.operatedAt, zone),
				begun: operation.operatedAt <= now
			},
			armStage
				? {
						maxElevationDeg: armStage.limits?.maxElevationDeg ?? null,
						maxLoadKg: armStage.limits?.maxLoadKg ?? null,
						reviewOn: armStage.reviewOn
					}
				: null,
			inForce.some((row) => row.kind === 'precautions-end'),
			limitsOfPatient(setOfUnit(layers.unit, episode.phase), layers)
		)
	};
}

/** The first of each kind of a list that begins with the newest. */
function newestOfKind(newestFirst: Clearance[]): Clearance[] {
	return newestFirst.filter((row, index) => newestFirst.findIndex(({ kind }) => kind === row.kind) === index);
}
