import { and, eq, inArray } from 'drizzle-orm';
import type { ClearanceEvidence, ClearanceLimits } from '$lib/domain/clearances/forms';
import { stateOn } from '$lib/domain/clearances/states';
import type { ClearanceKind } from '$lib/domain/core/codes';
import type { EpisodeRow } from '../access/access';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { clearances } from '../db/schema';
import type { EpisodeFacts } from '../episodes/facts';
import { newId } from '../ids';
import type { Change } from '../write';
import { gatherEvidence } from './evidence';
import { hospitalToday, lapse } from './lapse';
import { recordClearanceMove } from './moves';
import { askText } from './texts';

type ClearanceRow = typeof clearances.$inferSelect;

const OPEN_OR_IN_FORCE = ['asked', 'given', 'given-with-limits', 'on-hold'] as const;

/** One ask, as rows and consequences. */
export async function insertAsk(
	tx: Tx,
	context: PersonContext,
	about: { episode: EpisodeRow; facts: EpisodeFacts; threadId: string | null },
	ask: { kind: ClearanceKind; question: string; proposed?: ClearanceLimits }
): Promise<Change<{ id: string; state: 'asked'; evidence: ClearanceEvidence }>> {
	const { episode, facts, threadId } = about;
	const evidence = await gatherEvidence(tx, episode, facts, { now: context.now, since: context.now });
	const id = newId();
	const proposed = ask.proposed && Object.keys(ask.proposed).length > 0 ? ask.proposed : null;
	await tx.insert(clearances).values({
		id,
		episodeId: episode.id,
		operationId: facts.operation?.id ?? null,
		threadId,
		kind: ask.kind,
		state: 'asked',
		question: ask.question,
		proposed,
		askedBy: context.actor.id,
		askedAt: context.now,
		evidence
	});
	await recordClearanceMove(tx, context, { clearanceId: id, fromState: null, toState: 'asked', evidence });
	const body = askText(ask.kind, ask.question, proposed);
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
 * review date is past, lapses here and no longer stands in the way; what follows from that is answered too.
 */
export async function openOrInForce(
	tx: Tx,
	context: PersonContext,
	episodeId: string,
	kind: ClearanceKind,
	operationId: string | null
): Promise<{ open: ClearanceRow | null; lapsed: Change<null>[] }> {
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
		return { open: null, lapsed: [] };
	}
	const ended = stateOn(open, hospitalToday(context.now)) === 'lapsed';
	if (open.operationId === operationId && !ended) {
		return { open, lapsed: [] };
	}
	return { open: null, lapsed: [await lapse(tx, context, open, ended ? 'end' : 'earlier-operation')] };
}
