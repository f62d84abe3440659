import { desc, eq } from 'drizzle-orm';
import { alias } from 'drizzle-orm/sqlite-core';
import type { Person } from '$lib/domain/access/actor';
import type { ClearanceEvidence } from '$lib/domain/clearances/forms';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { ClearanceLine } from '$lib/domain/episodes/views';
import { accessClearance } from '../access/access';
import type { Reader } from '../db';
import { clearances, users } from '../db/schema';

const decider = alias(users, 'decider');

function select(db: Reader) {
	return db
		.select({ clearance: clearances, askedBy: users.name, decidedBy: decider.name })
		.from(clearances)
		.innerJoin(users, eq(users.id, clearances.askedBy))
		.leftJoin(decider, eq(decider.id, clearances.decidedBy));
}

type Row = Awaited<ReturnType<typeof select>>[number];

/** Every clearance of an episode, the newest ask first. */
export async function listClearances(db: Reader, episodeId: string): Promise<ClearanceLine[]> {
	const rows = await select(db)
		.where(eq(clearances.episodeId, episodeId))
		.orderBy(desc(clearances.askedAt), desc(clearances.id));
	return rows.map(toLine);
}

/** One clearance with what the decider was shown. */
export async function getClearance(
	db: Reader,
	person: Person,
	id: string
): Promise<ClearanceLine & { episodeId: string; threadId: string | null; evidence: ClearanceEvidence }> {
	const { clearance } = await accessClearance(db, person, id, 'thread.read');
	const [row] = await select(db).where(eq(clearances.id, id));
	if (!row) {
		throw new Error(`Clearance ${id} lost the person who asked.`);
	}
	return {
		...toLine(row),
		episodeId: clearance.episodeId,
		threadId: clearance.threadId,
		evidence: clearance.evidence
	};
}

function toLine({ clearance, askedBy, decidedBy }: Row): ClearanceLine {
	return {
		id: clearance.id,
		kind: clearance.kind,
		state: clearance.state,
		question: clearance.question,
		askedBy,
		askedAt: toRfc3339(clearance.askedAt),
		decidedBy,
		decidedAt: clearance.decidedAt === null ? null : toRfc3339(clearance.decidedAt),
		limits: clearance.limits,
		reviewOn: clearance.reviewOn,
		note: clearance.note,
		reason: clearance.reason
	};
}
