import { and, eq, inArray } from 'drizzle-orm';
import type { z } from 'zod';
import type { AuditAction } from '$lib/domain/audit/actions';
import type {
	askClearanceBody,
	ClearanceEvidence,
	ClearanceLimits,
	giveClearanceBody
} from '$lib/domain/clearances/forms';
import { nextClearanceState, type ClearanceMove } from '$lib/domain/clearances/states';
import type { ClearanceKind, ClearanceState } from '$lib/domain/core/codes';
import { Problem, invalidField } from '$lib/domain/core/errors';
import { localDateOf } from '$lib/domain/core/time';
import { CLEARANCE_WORDS } from '$lib/i18n/labels';
import { accessClearance, accessEpisode, threadForDeed } from '../access/access';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { clearanceMoves, clearances } from '../db/schema';
import { env } from '../env';
import { factsOf } from '../episodes/facts';
import { newId } from '../ids';
import { write, type Written } from '../write';
import { answerText } from './texts';
import { gatherEvidence } from './evidence';

const OPEN_OR_IN_FORCE = ['asked', 'given', 'given-with-limits', 'on-hold'] as const;

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
		const facts = (await factsOf(tx, [episode], context.now)).get(episodeId);
		if (!facts) {
			throw new Error(`No facts of episode ${episodeId}.`);
		}
		const operationId = facts.operation?.id ?? null;
		await refuseSecond(tx, context, episodeId, input.kind, operationId);
		const threadId = await threadForDeed(tx, episodeId, input.threadId);
		const evidence = await gatherEvidence(tx, episode, facts, context.now);
		const id = newId();
		await tx.insert(clearances).values({
			id,
			episodeId,
			operationId,
			threadId,
			kind: input.kind,
			state: 'asked',
			question: input.question,
			askedBy: context.actor.id,
			askedAt: context.now,
			evidence
		});
		await recordMove(tx, context, { clearanceId: id, fromState: null, toState: 'asked' });
		const body = `${CLEARANCE_WORDS[input.kind]()}: ${input.question}`;
		return {
			result: { id, state: 'asked', evidence },
			audit: {
				action: 'clearance.asked',
				objectKind: 'clearance',
				objectId: id,
				episodeId,
				detail: { kind: input.kind }
			},
			entries: threadId ? [{ threadId, kind: 'ask', body, ref: { kind: 'clearance', id } }] : [],
			events: [{ topic: 'clearance', kind: 'asked', id, episodeId }]
		};
	});
}

/** Give a clearance, with limits or without. */
export function giveClearance(context: PersonContext, id: string, input: z.infer<typeof giveClearanceBody>) {
	return decide(context, id, 'give', {
		limits: input.limits && Object.keys(input.limits).length > 0 ? input.limits : null,
		reviewOn: input.reviewOn ?? null,
		note: input.note ?? null,
		reason: null
	});
}

export function withholdClearance(context: PersonContext, id: string, reason: string) {
	return decide(context, id, 'withhold', { limits: null, reviewOn: null, note: null, reason });
}

export function holdClearance(context: PersonContext, id: string, reason: string) {
	return decide(context, id, 'hold', { reason });
}

/** Who asked may take the ask back; a decider may take back what was given. */
export function withdrawClearance(context: PersonContext, id: string, reason: string) {
	return decide(context, id, 'withdraw', { reason });
}

const ACTIONS: Record<ClearanceMove, AuditAction> = {
	give: 'clearance.given',
	withhold: 'clearance.withheld',
	hold: 'clearance.held',
	withdraw: 'clearance.withdrawn'
};

interface Decision {
	limits?: ClearanceLimits | null;
	reviewOn?: string | null;
	note?: string | null;
	reason: string | null;
}

function decide(
	context: PersonContext,
	id: string,
	move: ClearanceMove,
	decision: Decision
): Promise<Written<{ id: string; state: ClearanceState }>> {
	return write(context, move === 'withdraw' ? 'thread.read' : 'clearance.decide', async (tx) => {
		const { clearance } = await accessForMove(tx, context, id, move);
		const state = nextClearanceState(clearance.state, move, decision.limits);
		refusePastReview(decision.reviewOn, context.now);
		const limits = move === 'give' ? (decision.limits ?? null) : clearance.limits;
		await tx
			.update(clearances)
			.set({ ...decision, limits, state, decidedBy: context.actor.id, decidedAt: context.now })
			.where(eq(clearances.id, id));
		await recordMove(tx, context, {
			clearanceId: id,
			fromState: clearance.state,
			toState: state,
			limits,
			reason: decision.reason
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

async function accessForMove(tx: Tx, context: PersonContext, id: string, move: ClearanceMove) {
	if (move !== 'withdraw') {
		return accessClearance(tx, context.actor, id, 'clearance.decide');
	}
	const seen = await accessClearance(tx, context.actor, id, 'thread.read');
	const own = seen.clearance.askedBy === context.actor.id && seen.clearance.state === 'asked';
	return own ? seen : accessClearance(tx, context.actor, id, 'clearance.withdraw');
}

/** One of a kind open or in force; one that counts from an earlier operation is withdrawn by the return to theatre. */
async function refuseSecond(
	tx: Tx,
	context: PersonContext,
	episodeId: string,
	kind: ClearanceKind,
	operationId: string | null
): Promise<void> {
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
		return;
	}
	if (open.operationId !== operationId || reviewIsPast(open.reviewOn, context.now)) {
		await tx.update(clearances).set({ state: 'lapsed' }).where(eq(clearances.id, open.id));
		await recordMove(tx, context, { clearanceId: open.id, fromState: open.state, toState: 'lapsed' });
		return;
	}
	throw open.state === 'asked'
		? new Problem('already-asked', 'This clearance is asked and not decided yet.', {
				id: open.id,
				state: open.state
			})
		: new Problem('already-given', `This clearance is ${open.state}.`, { id: open.id, state: open.state });
}

function reviewIsPast(reviewOn: string | null, now: number): boolean {
	return reviewOn !== null && reviewOn < localDateOf(now, env().hospital.zone);
}

function refusePastReview(reviewOn: string | null | undefined, now: number): void {
	if (reviewOn && reviewIsPast(reviewOn, now)) {
		throw invalidField('/reviewOn', `reviewOn ${reviewOn} is past; it is today or later.`);
	}
}

async function recordMove(
	tx: Tx,
	context: PersonContext,
	move: Omit<typeof clearanceMoves.$inferInsert, 'id' | 'at' | 'byId'>
): Promise<void> {
	await tx.insert(clearanceMoves).values({ ...move, id: newId(), at: context.now, byId: context.actor.id });
}
