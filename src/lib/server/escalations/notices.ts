import { and, eq, gte, inArray, like, ne } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { NOTICE_AFTER_MS } from '$lib/domain/escalations/holding';
import { smsText, STAFF_NOTICES } from '$lib/domain/messages/templates';
import type { Tx } from '../db';
import { outbox } from '../db/schema';
import type { NewMessage } from '../outbox/enqueue';
import { placeOf, type EscalationRow } from './tell';

/** Of no use any more when it is this old: whoever wanted to come has come. */
const NOTICE_LIFE_MS = 10 * 60 * 1000;

const causeOf = (escalationId: string, rest: string) => `taken:${escalationId}:${rest}`;

/**
 * That somebody has it, to everybody whom a text message of this call has reached or is reaching, but not to the
 * taker; low ones make no noise. It waits until the taking can no longer be taken back.
 */
export async function noticesOfTaking(
	tx: Tx,
	before: EscalationRow,
	taker: Person,
	now: number
): Promise<NewMessage[]> {
	if (before.grade === 'low') {
		return [];
	}
	const told = await tx
		.selectDistinct({ userId: outbox.userId })
		.from(outbox)
		.where(
			and(
				eq(outbox.kind, 'escalation'),
				eq(outbox.refId, before.id),
				inArray(outbox.state, ['sending', 'accepted', 'delivered']),
				ne(outbox.userId, taker.id),
				gte(outbox.createdAt, before.takenAt ?? 0)
			)
		);
	const { unit, bed } = await placeOf(tx, before.episodeId);
	const fields = { unit, bed, grade: before.grade, holder: taker.role };
	const body = smsText('escalation-taken', fields);
	const notice = STAFF_NOTICES['call-taken'].en(fields);
	return told.flatMap(({ userId }) =>
		userId === null
			? []
			: [
					{
						kind: 'notice' as const,
						channel: 'sms' as const,
						causeKey: causeOf(before.id, `${now}:${userId}`),
						userId,
						body,
						notice,
						ref: { kind: 'escalation' as const, id: before.id },
						notBefore: now + NOTICE_AFTER_MS,
						expiresAt: now + NOTICE_LIFE_MS
					}
				]
	);
}

/** It was taken back before the others heard of it. */
export async function stopNotices(tx: Tx, escalationId: string): Promise<void> {
	await tx
		.update(outbox)
		.set({ state: 'cancelled', stateReason: 'taken back' })
		.where(
			and(
				eq(outbox.kind, 'notice'),
				like(outbox.causeKey, `${causeOf(escalationId, '')}%`),
				inArray(outbox.state, ['ready', 'held'])
			)
		);
}
