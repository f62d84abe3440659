import { and, desc, eq, isNotNull, ne } from 'drizzle-orm';
import { alias } from 'drizzle-orm/sqlite-core';
import type { Person } from '$lib/domain/access/actor';
import type { ClearanceEvidence } from '$lib/domain/clearances/forms';
import { marksOf, newsSince } from '$lib/domain/clearances/news';
import type { ClearanceView } from '$lib/domain/clearances/views';
import { isDecidable, stateOn } from '$lib/domain/clearances/states';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { ClearanceLine } from '$lib/domain/episodes/views';
import { accessClearance } from '../access/access';
import type { Reader } from '../db';
import { clearanceMoves, clearances, users } from '../db/schema';
import { factsOfOne } from '../episodes/facts';
import { questionsOf } from './ask-back';
import { gatherEvidence, shownTo } from './evidence';
import { hospitalToday } from './lapse';
import { isUnseenRefusal } from './refusal';

const decider = alias(users, 'decider');

function select(db: Reader) {
	return db
		.select({ clearance: clearances, askedBy: users.name, decidedBy: decider.name })
		.from(clearances)
		.innerJoin(users, eq(users.id, clearances.askedBy))
		.leftJoin(decider, eq(decider.id, clearances.decidedBy));
}

type Row = Awaited<ReturnType<typeof select>>[number];

/**
 * Every clearance of an episode, the newest ask first.
 * @param operationId the latest operation, from which clearances count; null without one
 */
export async function listClearances(
	db: Reader,
	episodeId: string,
	operationId: string | null,
	now: number
): Promise<ClearanceLine[]> {
	const rows = await select(db)
		.where(eq(clearances.episodeId, episodeId))
		.orderBy(desc(clearances.askedAt), desc(clearances.id));
	return rows.map((row) => toLine(row, operationId, now));
}

/** One clearance with what a decision on it rests on. */
export async function getClearance(
	db: Reader,
	person: Person,
	id: string,
	now: number
): Promise<ClearanceView> {
	const { clearance, episode } = await accessClearance(db, person, id, 'thread.read');
	const [[row], facts, decidedOn, questions] = await Promise.all([
		select(db).where(eq(clearances.id, id)),
		factsOfOne(db, episode, now),
		evidenceOfDecision(db, id),
		questionsOf(db, id)
	]);
	if (!row) {
		throw new Error(`Clearance ${id} lost the person who asked.`);
	}
	const line = toLine(row, facts.operation?.id ?? null, now);
	const seenBy = (evidence: ClearanceEvidence) => shownTo(person, episode.unitId, evidence);
	const since = clearance.decidedAt ?? clearance.askedAt;
	const decidable = line.current && isDecidable(line.state);
	const evidence = seenBy(
		decidable ? await gatherEvidence(db, episode, facts, { now, since }) : (decidedOn ?? clearance.evidence)
	);
	return {
		...line,
		episodeId: clearance.episodeId,
		threadId: clearance.threadId,
		askedById: clearance.askedBy,
		proposed: clearance.proposed,
		unseen: isUnseenRefusal(clearance),
		evidence,
		askedOn: seenBy(clearance.evidence),
		decidedOn: decidedOn && seenBy(decidedOn),
		news: line.state === 'asked' ? newsSince(marksOf(seenBy(clearance.evidence)), evidence) : null,
		shown: marksOf(evidence),
		questions
	};
}

/** What was on record at the latest decision; null before any, and for those from before it was kept. */
async function evidenceOfDecision(db: Reader, id: string): Promise<ClearanceEvidence | null> {
	const [decided] = await db
		.select({ evidence: clearanceMoves.evidence })
		.from(clearanceMoves)
		.where(
			and(
				eq(clearanceMoves.clearanceId, id),
				ne(clearanceMoves.toState, 'asked'),
				isNotNull(clearanceMoves.evidence)
			)
		)
		.orderBy(desc(clearanceMoves.at), desc(clearanceMoves.id))
		.limit(1);
	return decided?.evidence ?? null;
}

function toLine(
	{ clearance, askedBy, decidedBy }: Row,
	operationId: string | null,
	now: number
): ClearanceLine {
	return {
		id: clearance.id,
		kind: clearance.kind,
		state: stateOn(clearance, hospitalToday(now)),
		question: clearance.question,
		askedBy,
		askedAt: toRfc3339(clearance.askedAt),
		decidedBy,
		decidedAt: clearance.decidedAt === null ? null : toRfc3339(clearance.decidedAt),
		limits: clearance.limits,
		reviewOn: clearance.reviewOn,
		note: clearance.note,
		reason: clearance.reason,
		current: clearance.operationId === null || clearance.operationId === operationId
	};
}
