import { randomInt } from 'node:crypto';
import { and, eq, exists, gt, inArray, isNotNull, or } from 'drizzle-orm';
import { newReplyCode } from '$lib/domain/messages/staff-reply';
import type { Reader, Tx } from '../db';
import { escalationLinks, escalations } from '../db/schema';
import { LINK_LIFE_MS } from './tell';

const FINENESS = 2 ** 32;

/** A reply code for a new escalation: a late TAKE must never take another call. */
export async function freeReplyCode(tx: Tx, now: number): Promise<string> {
	const used = await heldReplyCodes(tx, now);
	return newReplyCode(used, () => randomInt(FINENESS) / FINENESS);
}

/**
 * Codes that no new call may have: those of open calls, and those that were texted so lately that somebody could still
 * answer. What counts is the newest text, because a call that nobody takes is texted again and again.
 */
export async function heldReplyCodes(db: Reader, now: number): Promise<Set<string>> {
	const lately = exists(
		db
			.select({ id: escalationLinks.id })
			.from(escalationLinks)
			.where(
				and(
					eq(escalationLinks.escalationId, escalations.id),
					gt(escalationLinks.createdAt, now - LINK_LIFE_MS)
				)
			)
	);
	const rows = await db
		.select({ code: escalations.replyCode })
		.from(escalations)
		.where(
			and(isNotNull(escalations.replyCode), or(inArray(escalations.state, ['raised', 'taken']), lately))
		);
	return new Set(rows.flatMap(({ code }) => code ?? []));
}
