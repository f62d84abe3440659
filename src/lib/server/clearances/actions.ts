import { eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { AuditAction } from '$lib/domain/audit/actions';
import type {
	askClearanceBody,
	ClearanceEvidence,
	ClearanceLimits,
	giveClearanceBody
} from '$lib/domain/clearances/forms';
import { newsSince } from '$lib/domain/clearances/news';
import {
	mustSayWhatStood,
	nextClearanceState,
	stateOn,
	type DecidingMove
} from '$lib/domain/clearances/states';
import type { ClearanceState } from '$lib/domain/core/codes';
import { Problem, invalidField } from '$lib/domain/core/errors';
import { isRfc3339, parseRfc3339, toRfc3339 } from '$lib/domain/core/instant';
import { newsWords } from '$lib/i18n/clearance-news';
import { limitWords } from '$lib/i18n/limits';
import { m } from '$lib/i18n/paraglide/messages';
import { accessClearance, accessEpisode, type EpisodeRow } from '../access/access';
import { threadForDeed } from '../access/thread';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { clearances, users } from '../db/schema';
import { factsOfOne } from '../episodes/facts';
import { after, write, type Written } from '../write';
import { insertAsk, openOrInForce } from './ask';
import { gatherEvidence, shownTo } from './evidence';
import { hospitalToday } from './lapse';
import { recordClearanceMove } from './moves';
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
 * What somebody had in view when they decided. What is left out is not checked, but for the decision before when
 * what was given is given with other limits.
 */
export interface Seen {
	/**
	 * The decision before theirs: its instant in RFC 3339, null for none. When another has come between, theirs is
	 * refused and names who was faster.
	 */
	decidedAt?: string | null;
	/** The evidence, as {@link marksOf} gives it. When something new is on record, theirs is refused and says what. */
	evidence?: string;
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

/** A decision is stored with what is on record: it must not claim that somebody knew what they were not shown. */
function refuseUnseen(
	{ actor }: PersonContext,
	{ unitId }: EpisodeRow,
	evidence: ClearanceEvidence | null,
	shown: string | undefined
): void {
	const news =
		evidence === null || shown === undefined ? null : newsSince(shown, shownTo(actor, unitId, evidence));
	if (news !== null) {
		throw new Problem('evidence-changed', m.clearances_evidence_changed({ news: newsWords(news) }), { news });
	}
}

/** Whether the decision on record is the one that they go by; an instant is the same however it is written. */
function isSeen({ decidedAt }: ClearanceRow, seen: Seen['decidedAt']): boolean {
	if (seen === undefined || seen === null) {
		return seen === undefined || decidedAt === null;
	}
	return isRfc3339(seen) && parseRfc3339(seen) === decidedAt;
}

async function refuseSlower(
	tx: Tx,
	clearance: ClearanceRow,
	seen: Seen['decidedAt'],
	mustSay: boolean
): Promise<void> {
	if (isSeen(clearance, seen) && !(mustSay && seen === undefined)) {
		return;
	}
	const { state, decidedBy, decidedAt } = clearance;
	const [decider] = await tx
		.select({ name: users.name })
		.from(users)
		.where(eq(users.id, decidedBy ?? ''));
	throw new Problem('wrong-state', `${decider?.name ?? 'Somebody'} was faster: the clearance is ${state}.`, {
		state,
		decidedBy: decider?.name ?? null,
		decidedAt: decidedAt === null ? null : toRfc3339(decidedAt)
	});
}

async function accessForMove(tx: Tx, context: PersonContext, id: string, move: DecidingMove) {
	if (move !== 'withdraw') {
		return accessClearance(tx, context.actor, id, 'clearance.decide');
	}
	const seen = await accessClearance(tx, context.actor, id, 'thread.read');
	const own = seen.clearance.askedBy === context.actor.id && seen.clearance.state === 'asked';
	return own ? seen : accessClearance(tx, context.actor, id, 'clearance.withdraw');
}

/** A figure that was proposed is not passed over by leaving it out. */
function refusePassedOver({ state, proposed }: ClearanceRow, limitsSaid: boolean | undefined): void {
	if (state === 'asked' && proposed !== null && limitsSaid === false) {
		const limits = limitWords(proposed).join(', ');
		throw invalidField('/limits', `limits is left out and ${limits} was proposed; say it, or null for none.`);
	}
}

function refusePastReview(reviewOn: string | null | undefined, now: number): void {
	if (reviewOn && reviewOn < hospitalToday(now)) {
		throw invalidField('/reviewOn', `reviewOn ${reviewOn} is past; it is today or later.`);
	}
}
