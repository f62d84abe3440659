import { and, eq, inArray } from 'drizzle-orm';
import { chainStep, isChainSpent, startFor } from '$lib/domain/escalations/chain';
import { hurried } from '$lib/domain/escalations/needed-by';
import type { Post } from '$lib/domain/core/codes';
import { smsText, STAFF_NOTICES } from '$lib/domain/messages/templates';
import { onCover } from '../cover/queries';
import type { Reader, Tx } from '../db';
import { episodes, escalationLinks, escalations, escalationSteps, outbox, units } from '../db/schema';
import { newId } from '../ids';
import { aroundLink, linkDigest, linkToken } from '../links';
import type { NewMessage } from '../outbox/enqueue';
import { callerOf } from './follow';

export type EscalationRow = typeof escalations.$inferSelect;

/** A link outlives every shift that could still hold the message. */
export const LINK_LIFE_MS = 12 * 60 * 60 * 1000;
/** An alert that has not left after an hour is of no use any more; the chain has long gone on. */
const MESSAGE_LIFE_MS = 60 * 60 * 1000;

/**
 * Tell everybody of one step of the chain, inside the transaction that moves the timer. Who was told is recorded,
 * and so is a post that nobody covers. Nobody is told of their own call, nor a holder who was asked already.
 * @returns the messages to enqueue; empty when the step reached nobody
 */
export async function tellStep(
	tx: Tx,
	escalation: EscalationRow,
	step: number,
	now: number
): Promise<NewMessage[]> {
	const dueAt = escalation.chainStartedAt + chainStep(escalation.grade, step).afterSeconds * 1000;
	const where = await placeOf(tx, escalation.episodeId);
	const told = await knowing(tx, escalation);
	const messages: NewMessage[] = [];
	for (const post of chainStep(escalation.grade, step).posts) {
		const covering = (await onCover(tx, where.unitId, post, now)).filter((p) => p.phone);
		const people = covering.filter((p) => !told.has(p.userId));
		if (covering.length === 0) {
			await recordStep(tx, escalation.id, { step, post, dueAt, at: now });
		}
		for (const { userId } of people) {
			told.add(userId);
			const message = await alert(tx, escalation, userId, where, `${step}`, now);
			await recordStep(tx, escalation.id, { step, post, dueAt, at: now, userId, messageId: message.id });
			messages.push(message);
		}
	}
	return messages;
}

/**
 * Tell from a step on until somebody is reached: a step that nobody covers must not cost the minutes until the
 * next. Stops at the end of the planned chain, which then repeats by its timer.
 */
export async function tellFrom(
	tx: Tx,
	escalation: EscalationRow,
	step: number,
	now: number
): Promise<{ messages: NewMessage[]; lastStep: number }> {
	for (let at = step; ; at += 1) {
		const messages = await tellStep(tx, escalation, at, now);
		if (messages.length > 0 || isChainSpent(escalation.grade, at + 1)) {
			return { messages, lastStep: at };
		}
	}
}

async function knowing(tx: Tx, escalation: EscalationRow): Promise<Set<string>> {
	const { takenBy, holderAskedAt } = escalation;
	const asked = takenBy !== null && holderAskedAt !== null ? [takenBy] : [];
	return new Set([await callerOf(tx, escalation), ...asked]);
}

/**
 * Start the chain at a step now, or let it go on there, and set the timer of the next one. The steps keep their
 * distances from this moment.
 */
export async function startChain(
	tx: Tx,
	escalation: EscalationRow,
	step: number,
	now: number
): Promise<NewMessage[]> {
	const row = { ...escalation, chainStartedAt: startFor(escalation.grade, step, now) };
	const { messages, lastStep } = await tellFrom(tx, row, step, now);
	await setTimer(tx, row, lastStep + 1, now);
	return messages;
}

/** From now on the timer waits for this step, which comes sooner when somebody is needed before it. */
export async function setTimer(
	tx: Tx,
	{ id, grade, chainStartedAt, neededBy }: EscalationRow,
	nextStep: number,
	now: number
) {
	const planned = chainStartedAt + chainStep(grade, nextStep).afterSeconds * 1000;
	const nextStepAt = hurried(planned, neededBy, now);
	await tx.update(escalations).set({ nextStep, nextStepAt, chainStartedAt }).where(eq(escalations.id, id));
}

/** The alert to one person: unit, bed, grade, a link that only they can use, and the code to reply TAKE with. */
export async function alert(
	tx: Tx,
	escalation: EscalationRow,
	userId: string,
	where: { unit: string; bed: string | null },
	occasion: string,
	now: number
): Promise<NewMessage & { id: string }> {
	const { unit, bed } = where;
	const { grade, replyCode: code } = escalation;
	const body = aroundLink((link) => smsText('escalation', { unit, bed, grade, link, code }));
	const notice = STAFF_NOTICES.call.en({ unit, bed, grade });
	return withLink(tx, escalation, userId, { body, notice }, occasion, now);
}

/** What a text and the notices beside it say. */
type Words = Required<Pick<NewMessage, 'body' | 'notice'>>;

/** A message to one person with a link that only they can use; `{link}` in the text stands for it. */
export async function withLink(
	tx: Tx,
	escalation: EscalationRow,
	userId: string,
	{ body, notice }: Words,
	occasion: string,
	now: number
): Promise<NewMessage & { id: string }> {
	const linkId = newId();
	await tx.insert(escalationLinks).values({
		id: linkId,
		escalationId: escalation.id,
		userId,
		tokenHash: linkDigest(linkToken(linkId)),
		createdAt: now,
		expiresAt: now + LINK_LIFE_MS
	});
	return {
		id: newId(),
		kind: 'escalation',
		channel: 'sms',
		causeKey: `escalation:${escalation.id}:${escalation.chainStartedAt}:${occasion}:${userId}`,
		userId,
		body,
		notice,
		linkId,
		ref: { kind: 'escalation', id: escalation.id },
		expiresAt: now + MESSAGE_LIFE_MS
	};
}

/** Where the patient lies now: a bed move after the raising sends the next people to the right bed. */
export async function placeOf(reader: Reader, episodeId: string) {
	const [row] = await reader
		.select({ unitId: units.id, unit: units.name, bed: episodes.bed })
		.from(episodes)
		.innerJoin(units, eq(units.id, episodes.unitId))
		.where(eq(episodes.id, episodeId));
	if (!row) {
		throw new Error(`Episode ${episodeId} has no unit.`);
	}
	return row;
}

/** Stop what has not left yet: somebody has it, or nobody is needed any more. */
export async function stopAlerts(tx: Tx, escalationId: string, reason: string): Promise<void> {
	await tx
		.update(outbox)
		.set({ state: 'cancelled', stateReason: reason })
		.where(
			and(
				eq(outbox.kind, 'escalation'),
				eq(outbox.refKind, 'escalation'),
				eq(outbox.refId, escalationId),
				inArray(outbox.state, ['ready', 'held'])
			)
		);
}

/** The messages that a worker has in hand: one it has not checked yet is skipped once somebody has it. */
export async function leavingOf(tx: Tx, escalationId: string): Promise<string[]> {
	const rows = await tx
		.select({ id: outbox.id })
		.from(outbox)
		.where(and(eq(outbox.kind, 'escalation'), eq(outbox.refId, escalationId), eq(outbox.state, 'sending')));
	return rows.map(({ id }) => id);
}

async function recordStep(
	tx: Tx,
	escalationId: string,
	row: { step: number; post: Post; dueAt: number; at: number; userId?: string; messageId?: string }
): Promise<void> {
	await tx.insert(escalationSteps).values({
		id: newId(),
		escalationId,
		...row,
		userId: row.userId ?? null,
		channel: row.userId ? 'sms' : null,
		messageId: row.messageId ?? null
	});
}
