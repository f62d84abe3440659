import { and, eq, inArray } from 'drizzle-orm';
import type { ClearanceEvidence } from '$lib/domain/clearances/forms';
import type { ClearanceKind } from '$lib/domain/core/codes';
import { localDateOf } from '$lib/domain/core/time';
import { CLEARANCE_WORDS } from '$lib/i18n/labels';
import type { EpisodeRow } from '../access/access';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { clearanceMoves, clearances } from '../db/schema';
import { env } from '../env';
import type { EpisodeFacts } from '../episodes/facts';
import { newId } from '../ids';
import type { Change } from '../write';
import { gatherEvidence } from './evidence';

type ClearanceRow = typeof clearances.$inferSelect;

const OPEN_OR_IN_FORCE = ['asked', 'given', 'given-with-limits', 'on-hold'] as const;

/** One ask, as rows and consequences: used by asking, and by a session that was recorded against the rules. */
export async function insertAsk(
	tx: Tx,
	context: PersonContext,
	about: { episode: EpisodeRow; facts: EpisodeFacts; threadId: string | null },
	ask: { kind: ClearanceKind; question: string }
): Promise<Change<{ id: string; state: 'asked'; evidence: ClearanceEvidence }>> {
	const { episode, facts, threadId } = about;
	const evidence = await gatherEvidence(tx, episode, facts, context.now);
	const id = newId();
	await tx.insert(clearances).values({
		id,
		episodeId: episode.id,
		operationId: facts.operation?.id ?? null,
		threadId,
		kind: ask.kind,
		state: 'asked',
		question: ask.question,
		askedBy: context.actor.id,
		askedAt: context.now,
		evidence
	});
	await recordClearanceMove(tx, context, { clearanceId: id, fromState: null, toState: 'asked' });
	const body = `${CLEARANCE_WORDS[ask.kind]()}: ${ask.question}`;
	return {
		result: { id, state: 'asked', evidence },
		audit: {
			action: 'clearance.asked',
			objectKind: 'clearance',
			objectId: id,
			episodeId: episode.id,
			detail: { kind: ask.kind }
		},
		entries: threadId ? [{ threadId, kind: 'ask', body, ref: { kind: 'clearance', id } }] : [],
		events: [{ topic: 'clearance', kind: 'asked', id, episodeId: episode.id }]
	};
}

/**
 * The clearance of a kind that is open or in force, or null. One that counts from an earlier operation, or whose
 * review date is past, lapses here and no longer stands in the way.
 */
export async function openOrInForce(
	tx: Tx,
	context: PersonContext,
	episodeId: string,
	kind: ClearanceKind,
	operationId: string | null
): Promise<ClearanceRow | null> {
	const [open] = await tx
		.select()
		.from(clearances)
		.where(
			and(
				eq(clearances.episodeId, episodeId),
				eq(clearances.kind, kind),
				inArray(clearances.state, [...OPEN_OR_IN_FORCE])
			)
		);
	if (!open) {
		return null;
	}
	if (open.operationId === operationId && !reviewIsPast(open.reviewOn, context.now)) {
		return open;
	}
	await tx.update(clearances).set({ state: 'lapsed' }).where(eq(clearances.id, open.id));
	await recordClearanceMove(tx, context, { clearanceId: open.id, fromState: open.state, toState: 'lapsed' });
	return null;
}

export function reviewIsPast(reviewOn: string | null, now: number): boolean {
	return reviewOn !== null && reviewOn < localDateOf(now, env().hospital.zone);
}

/** Write one line of a clearance's history. */
export async function recordClearanceMove(
	tx: Tx,
	context: PersonContext,
	move: Omit<typeof clearanceMoves.$inferInsert, 'id' | 'at' | 'byId'>
): Promise<void> {
	await tx.insert(clearanceMoves).values({ ...move, id: newId(), at: context.now, byId: context.actor.id });
}
