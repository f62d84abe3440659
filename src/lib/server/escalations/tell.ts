import { and, eq, inArray } from 'drizzle-orm';
import { chainStep, isChainSpent } from '$lib/domain/escalations/chain';
import type { Post } from '$lib/domain/core/codes';
import { smsText } from '$lib/domain/messages/templates';
import { onCover } from '../cover/queries';
import type { Tx } from '../db';
import type { escalations } from '../db/schema';
import { episodes, escalationLinks, escalationSteps, outbox, units } from '../db/schema';
import { newId } from '../ids';
import { aroundLink, linkDigest, linkToken } from '../links';
import type { NewMessage } from '../outbox/enqueue';

export type EscalationRow = typeof escalations.$inferSelect;

/** A link outlives every shift that could still hold the message. */
export const LINK_LIFE_MS = 12 * 60 * 60 * 1000;
/** An alert that has not left after an hour is of no use any more; the chain has long gone on. */
const MESSAGE_LIFE_MS = 60 * 60 * 1000;

/**
 * Tell everybody of one step of the chain, inside the transaction that moves the timer. Who was told is recorded,
 * and so is a post that nobody covers. The raiser is not told of their own call.
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
	const told = new Set<string>([escalation.raisedBy]);
	const messages: NewMessage[] = [];
	for (const post of chainStep(escalation.grade, step).posts) {
		const people = (await onCover(tx, where.unitId, post, now)).filter((p) => !told.has(p.userId) && p.phone);
		if (people.length === 0) {
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

/** The alert to one person: unit, bed, grade, a link that only they can use, and the code to reply TAKE with. */
export async function alert(
	tx: Tx,
	escalation: EscalationRow,
	userId: string,
	where: { unit: string; bed: string | null },
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
		body: aroundLink((link) =>
			smsText('escalation', {
				unit: where.unit,
				bed: where.bed,
				grade: escalation.grade,
				link,
				code: escalation.replyCode
			})
		),
		linkId,
		ref: { kind: 'escalation', id: escalation.id },
		expiresAt: now + MESSAGE_LIFE_MS
	};
}

/** Where the patient lies now: a bed move after the raising sends the next people to the right bed. */
export async function placeOf(tx: Tx, episodeId: string) {
	const [row] = await tx
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
				eq(outbox.refKind, 'escalation'),
				eq(outbox.refId, escalationId),
				inArray(outbox.state, ['ready', 'held'])
			)
		);
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
