import { and, eq, gt, isNotNull, isNull, lt, lte } from 'drizzle-orm';
import { can } from '$lib/domain/access/can';
import { levelAfter, measuresAgain, rhythmAtEnd, todayAfter } from '$lib/domain/bedside/carry-over';
import type { Verdict } from '$lib/domain/bedside/finding';
import type { SessionBody } from '$lib/domain/bedside/forms';
import { isSenior } from '$lib/domain/bedside/sign-off';
import { parseRfc3339 } from '$lib/domain/core/instant';
import { notInError } from './queries';
import type { EpisodeRow } from '../access/access';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { bedsideSessions, episodes, escalations, levelDecisions, operations } from '../db/schema';

/**
 * What a session told about the patient, for the nameboard and for the next session's page. What was before a
 * later operation says nothing of the patient now; rhythm and rate-slowing drug come from the newest session
 * alone, because a session can be entered late.
 */
export async function carryOver(
	tx: Tx,
	context: PersonContext,
	episode: EpisodeRow,
	input: SessionBody,
	verdict: Verdict
): Promise<void> {
	const startedAt = parseRfc3339(input.startedAt);
	await closeRechecks(tx, context, episode.id, input, startedAt);
	if (await operatedSince(tx, episode.id, startedAt, context.now)) {
		return;
	}
	const decided = await levelDecidedSince(tx, episode.id, startedAt);
	const decides = can(context.actor, 'level.decide', { unitId: episode.unitId });
	const told = { ...input, outcome: verdict.outcome };
	const newest = !(await laterSession(tx, episode.id, startedAt));
	// 'Not known' is an answer too: an older one must not stand in its place.
	const { betaBlocked } = input.context;
	await tx
		.update(episodes)
		.set({
			// What somebody decided about today's level later than this stands; what was reached was reached.
			level: decided || !decides ? episode.level : todayAfter(episode.level, told, isSenior(context.actor)),
			levelReached: levelAfter(episode.levelReached, told),
			...(newest ? { rhythm: rhythmAtEnd(input), betaBlocked } : {})
		})
		.where(eq(episodes.id, episode.id));
}

/** A re-check is owed since the call was settled: only what was measured after that answers it. */
async function closeRechecks(
	tx: Tx,
	context: PersonContext,
	episodeId: string,
	input: SessionBody,
	startedAt: number
): Promise<void> {
	if (!measuresAgain(input)) {
		return;
	}
	await tx
		.update(escalations)
		.set({ recheckDoneAt: context.now })
		.where(
			and(
				eq(escalations.episodeId, episodeId),
				isNotNull(escalations.recheckDueAt),
				isNull(escalations.recheckDoneAt),
				lt(escalations.endedAt, startedAt)
			)
		);
}

async function operatedSince(tx: Tx, episodeId: string, startedAt: number, now: number): Promise<boolean> {
	const [later] = await tx
		.select({ id: operations.id })
		.from(operations)
		.where(
			and(
				eq(operations.episodeId, episodeId),
				gt(operations.operatedAt, startedAt),
				lte(operations.operatedAt, now)
			)
		)
		.limit(1);
	return later !== undefined;
}

async function levelDecidedSince(tx: Tx, episodeId: string, startedAt: number): Promise<boolean> {
	const [later] = await tx
		.select({ id: levelDecisions.id })
		.from(levelDecisions)
		.where(and(eq(levelDecisions.episodeId, episodeId), gt(levelDecisions.decidedAt, startedAt)))
		.limit(1);
	return later !== undefined;
}

async function laterSession(tx: Tx, episodeId: string, startedAt: number): Promise<boolean> {
	const [later] = await tx
		.select({ id: bedsideSessions.id })
		.from(bedsideSessions)
		.where(
			and(eq(bedsideSessions.episodeId, episodeId), gt(bedsideSessions.startedAt, startedAt), notInError())
		)
		.limit(1);
	return later !== undefined;
}
