import { eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { AuditAction } from '$lib/domain/audit/actions';
import type {
	askClearanceBody,
	ClearanceEvidence,
	ClearanceLimits,
	giveClearanceBody
} from '$lib/domain/clearances/forms';
import {
	mustSayWhatStood,
	nextClearanceState,
	stateOn,
	type DecidingMove
} from '$lib/domain/clearances/states';
import type { ClearanceState } from '$lib/domain/core/codes';
import { Problem } from '$lib/domain/core/errors';
import { accessClearance, accessEpisode, type EpisodeRow } from '../access/access';
import { threadForDeed } from '../access/thread';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { clearances } from '../db/schema';
import { factsOfOne } from '../episodes/facts';
import { after, write, type Written } from '../write';
import { insertAsk, openOrInForce } from './ask';
import { gatherEvidence } from './evidence';
import { hospitalToday } from './lapse';
import { recordClearanceMove } from './moves';
import { refusePassedOver, refusePastReview, refuseSlower, refuseUnseen, type Seen } from './refuse';
import { answerText } from './texts';

/**
 * Ask for permission to start a kind of activity.
 * @throws Problem `already-asked` or `already-given` when one of the kind is open or in force
 */
export function askClearance(
	context: PersonContext,
	episodeId: string,
	input: z.infer<typeof askClearanceBody>
): Promise<Written<{ id: string; state: 'asked'; evidence: ClearanceEvidence }>> {
	return write(context, 'clearance.ask', async (tx) => {
		const episode = await accessEpisode(tx, context.actor, episodeId, 'clearance.ask');
		const facts = await factsOfOne(tx, episode, context.now);
		const operationId = facts.operation?.id ?? null;
		const { open, lapsed } = await openOrInForce(tx, context, episodeId, input.kind, operationId);
		if (open) {
			throw second(open);
		}
		const threadId = await threadForDeed(tx, episodeId, context.actor, input.threadId);
		return after(lapsed, await insertAsk(tx, context, { episode, facts, threadId }, input));
	});
}

function second(open: { id: string; state: ClearanceState }): Problem {
	const facts = { id: open.id, state: open.state };
	return open.state === 'asked'
		? new Problem('already-asked', 'This clearance is asked and not decided yet.', facts)
		: new Problem('already-given', `This clearance is ${open.state}; it need not be asked again.`, facts);
}

/**
 * Give a clearance, with limits or without. Where the ask proposed limits, a yes without any has to say so.
 * @throws Problem `invalid` at `/limits` where they are left out and some were proposed
 */
export function giveClearance(
	context: PersonContext,
	id: string,
	input: z.infer<typeof giveClearanceBody>,
	seen: Seen = {}
) {
	const decision = {
		limits: input.limits && Object.keys(input.limits).length > 0 ? input.limits : null,
		reviewOn: input.reviewOn ?? null,
		note: input.note ?? null,
		reason: null
	};
	return decide(context, id, 'give', decision, { ...seen, limitsSaid: input.limits !== undefined });
}

export function withholdClearance(context: PersonContext, id: string, reason: string, seen: Seen = {}) {
	return decide(context, id, 'withhold', { limits: null, reviewOn: null, note: null, reason }, seen);
}

export function holdClearance(context: PersonContext, id: string, reason: string, seen: Seen = {}) {
	return decide(context, id, 'hold', { reason }, seen);
}

/** Who asked may take the ask back; a decider may take back what was given. */
export function withdrawClearance(context: PersonContext, id: string, reason: string, seen: Seen = {}) {
	return decide(context, id, 'withdraw', { reason }, seen);
}

const ACTIONS: Record<DecidingMove, AuditAction> = {
	give: 'clearance.given',
	withhold: 'clearance.withheld',
	hold: 'clearance.held',
	withdraw: 'clearance.withdrawn'
};

type ClearanceRow = typeof clearances.$inferSelect;

interface Decision {
	limits?: ClearanceLimits | null;
	reviewOn?: string | null;
	note?: string | null;
	reason: string | null;
}

function decide(
	context: PersonContext,
	id: string,
	move: DecidingMove,
	decision: Decision,
	seen: Seen & { limitsSaid?: boolean }
): Promise<Written<{ id: string; state: ClearanceState }>> {
	return write(context, move === 'withdraw' ? 'thread.read' : 'clearance.decide', async (tx) => {
		const { clearance, episode } = await accessForMove(tx, context, id, move);
		const stood = stateOn(clearance, hospitalToday(context.now));
		await refuseSlower(tx, clearance, seen.decidedAt, mustSayWhatStood(stood, move));
		const state = nextClearanceState(stood, move, decision.limits);
		refusePastReview(decision.reviewOn, context.now);
		refusePassedOver(clearance, seen.limitsSaid);
		const limits = move === 'give' ? (decision.limits ?? null) : clearance.limits;
		const reviewOn = decision.reviewOn === undefined ? clearance.reviewOn : decision.reviewOn;
		// An ask taken back was never decided; only a decision can hold what the level allows.
		const takenBack = move === 'withdraw' && clearance.state === 'asked';
		const decidedBy = takenBack ? null : context.actor.id;
		// Before anything changes: what the decider could see, not what comes of the decision.
		const evidence = takenBack ? null : await evidenceNow(tx, context, { clearance, episode });
		refuseUnseen(context, episode, evidence, seen.evidence);
		await tx
			.update(clearances)
			.set({ ...decision, limits, state, decidedBy, decidedAt: context.now, refusalSeenAt: null })
			.where(eq(clearances.id, id));
		await recordClearanceMove(tx, context, {
			clearanceId: id,
			fromState: clearance.state,
			toState: state,
			limits,
			reviewOn,
			reason: decision.reason,
			evidence
		});
		const { threadId, episodeId } = clearance;
		const body = answerText(clearance.kind, state, { ...decision, limits });
		return {
			result: { id, state },
			audit: {
				action: ACTIONS[move],
				objectKind: 'clearance',
				objectId: id,
				episodeId,
				detail: { kind: clearance.kind, from: clearance.state, to: state }
			},
			entries: threadId ? [{ threadId, kind: 'answer', body, ref: { kind: 'clearance', id } }] : [],
			events: [{ topic: 'clearance', kind: state, id, episodeId }]
		};
	});
}

/** What the decider could see of the patient at the moment of deciding. */
async function evidenceNow(
	tx: Tx,
	{ now }: PersonContext,
	{ clearance, episode }: { clearance: ClearanceRow; episode: EpisodeRow }
): Promise<ClearanceEvidence> {
	const since = clearance.decidedAt ?? clearance.askedAt;
	return gatherEvidence(tx, episode, await factsOfOne(tx, episode, now), { now, since });
}

async function accessForMove(tx: Tx, context: PersonContext, id: string, move: DecidingMove) {
	if (move !== 'withdraw') {
		return accessClearance(tx, context.actor, id, 'clearance.decide');
	}
	const seen = await accessClearance(tx, context.actor, id, 'thread.read');
	const own = seen.clearance.askedBy === context.actor.id && seen.clearance.state === 'asked';
	return own ? seen : accessClearance(tx, context.actor, id, 'clearance.withdraw');
}
