/** What follows when a call for help did not get through to the person it was written for: nobody waits for a timer. */
import { and, eq, gte, inArray, isNotNull } from 'drizzle-orm';
import { isChainSpent } from '$lib/domain/escalations/chain';
import { isSoughtAnew } from '$lib/domain/escalations/holding';
import { STAFF_CALLS } from '$lib/domain/messages/templates';
import type { Tx } from '../db';
import { escalations, escalationSteps, outbox } from '../db/schema';
import { newId } from '../ids';
import type { OutboxRow } from '../outbox/change';
import { enqueue, type NewMessage } from '../outbox/enqueue';
import { placeOf, type EscalationRow } from './tell';

/** A text whose fate is unknown may have arrived; one that failed has not. */
export type Trouble = 'unknown' | 'failed';

/** A message in one of these states has reached somebody or still may. */
const MAY_REACH = ['ready', 'sending', 'held', 'accepted', 'delivered'] as const;

/**
 * The next channel, or the next person, in the transaction that puts the trouble on record: for a high call whose text
 * failed or may have, the person's telephone rings. Where nobody of those who were told can be reached any more, the
 * next step of the chain is due at once. At its end the chain keeps to its timer, or a gateway that is down would be
 * asked without a pause.
 */
export async function seekOtherWay(tx: Tx, row: OutboxRow, trouble: Trouble, now: number): Promise<void> {
	if (row.kind !== 'escalation' || row.refKind !== 'escalation' || row.userId === null) {
		return;
	}
	const [escalation] = await tx.select().from(escalations).where(eq(escalations.id, row.refId));
	if (!escalation || !mayBeTakenBy(escalation, row.userId)) {
		return;
	}
	if (row.channel === 'sms' && escalation.grade === 'high' && now < row.expiresAt) {
		await enqueueCall(tx, escalation, row, now);
	}
	if (trouble === 'failed') {
		await hurryChain(tx, escalation, now);
	}
}

/** Nobody has it, others are sought beside its holder, or it was passed on to them. */
function mayBeTakenBy(escalation: EscalationRow, userId: string): boolean {
	const { state, passTo, takenBy } = escalation;
	return (
		state === 'raised' ||
		(state === 'taken' && passTo === userId) ||
		(takenBy !== userId && isSoughtAnew(escalation))
	);
}

/** Once for each text: the key of its cause names the text. */
async function enqueueCall(tx: Tx, escalation: EscalationRow, text: OutboxRow, now: number): Promise<void> {
	const causeKey = `call:${text.id}`;
	if ((await tx.$count(outbox, eq(outbox.causeKey, causeKey))) > 0) {
		return;
	}
	const { unit, bed } = await placeOf(tx, escalation.episodeId);
	const message: NewMessage & { id: string } = {
		id: newId(),
		kind: 'escalation',
		channel: 'voice',
		causeKey,
		userId: text.userId ?? undefined,
		body: STAFF_CALLS.call.en({ unit, bed, grade: escalation.grade }),
		ref: { kind: 'escalation', id: escalation.id },
		expiresAt: text.expiresAt
	};
	await enqueue(tx, now, [message]);
	const [told] = await tx.select().from(escalationSteps).where(eq(escalationSteps.messageId, text.id));
	if (told) {
		await tx
			.insert(escalationSteps)
			.values({ ...told, id: newId(), at: now, channel: 'voice', messageId: message.id });
	}
}

async function hurryChain(tx: Tx, escalation: EscalationRow, now: number): Promise<void> {
	const { id, grade, nextStep, chainStartedAt } = escalation;
	if (nextStep === null || isChainSpent(grade, nextStep) || (await mayReachAny(tx, id, chainStartedAt))) {
		return;
	}
	await tx
		.update(escalations)
		.set({ nextStepAt: now })
		.where(and(eq(escalations.id, id), isNotNull(escalations.nextStepAt)));
}

/** May anybody who was told since the chain started still hear of it? */
async function mayReachAny(tx: Tx, escalationId: string, since: number): Promise<boolean> {
	const found = await tx
		.select({ id: outbox.id })
		.from(escalationSteps)
		.innerJoin(outbox, eq(outbox.id, escalationSteps.messageId))
		.where(
			and(
				eq(escalationSteps.escalationId, escalationId),
				gte(escalationSteps.at, since),
				inArray(outbox.state, [...MAY_REACH])
			)
		)
		.limit(1);
	return found.length > 0;
}
