/** What follows when a call for help did not get through to the person it was written for: nobody waits for a timer. */
import { and, eq, gte, inArray, isNotNull } from 'drizzle-orm';
import { isChainSpent } from '$lib/domain/escalations/chain';
import { isSoughtAnew } from '$lib/domain/escalations/holding';
import type { Tx } from '../db';
import { escalations, escalationSteps, outbox } from '../db/schema';
import type { OutboxRow } from '../outbox/change';
import { mailInstead, telephone } from './other-way';
import type { EscalationRow } from './tell';

/** A text whose fate is unknown may have arrived; one that failed has not. */
export type Trouble = 'unknown' | 'failed';

/** A message in one of these states has reached somebody or still may. What is held has no way out. */
const MAY_REACH = ['ready', 'sending', 'accepted', 'delivered'] as const;
/** A mailbox is not looked into at night: a mail goes too, and nobody waits for what comes of it. */
const HEARD = ['sms', 'voice', 'push'] as const;

/**
 * The next channel, or the next person, in the transaction that puts the trouble on record. For a high call whose text
 * failed or may have, the person's telephone rings; for any other the notices on their devices, which went out with the
 * text, do, and where they have none or none got through a mail goes. Where nobody of those who were told can be reached
 * any more, the next step of the chain is due at once. At its end the chain keeps to its timer, or a gateway that is
 * down would be asked without a pause.
 */
export async function seekOtherWay(tx: Tx, row: OutboxRow, trouble: Trouble, now: number): Promise<void> {
	if (row.kind !== 'escalation' || row.refKind !== 'escalation' || row.userId === null) {
		return;
	}
	const [escalation] = await tx.select().from(escalations).where(eq(escalations.id, row.refId));
	if (!escalation || !mayBeTakenBy(escalation, row.userId)) {
		return;
	}
	if (now < row.expiresAt) {
		await nextWay(tx, escalation, row, now);
	}
	if (trouble === 'failed') {
		await hurryChain(tx, escalation, now);
	}
}

async function nextWay(tx: Tx, escalation: EscalationRow, row: OutboxRow, now: number): Promise<void> {
	if (escalation.grade !== 'high') {
		await mailInstead(tx, escalation, row, now);
	} else if (row.channel === 'sms') {
		await telephone(tx, escalation, row, now);
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
				inArray(outbox.state, [...MAY_REACH]),
				inArray(outbox.channel, [...HEARD])
			)
		)
		.limit(1);
	return found.length > 0;
}
