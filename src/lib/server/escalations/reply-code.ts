import { randomInt } from 'node:crypto';
import { and, gt, inArray, isNotNull, or } from 'drizzle-orm';
import { newReplyCode } from '$lib/domain/messages/staff-reply';
import type { Tx } from '../db';
import { escalations } from '../db/schema';
import { LINK_LIFE_MS } from './tell';

const FINENESS = 2 ** 32;

/**
 * A reply code for a new escalation. It is no open call's, and none's that was raised so lately that somebody
 * could still answer its text: a late TAKE must never take another call.
 */
export async function freeReplyCode(tx: Tx, now: number): Promise<string> {
	const rows = await tx
		.select({ code: escalations.replyCode })
		.from(escalations)
		.where(
			and(
				isNotNull(escalations.replyCode),
				or(inArray(escalations.state, ['raised', 'taken']), gt(escalations.raisedAt, now - LINK_LIFE_MS))
			)
		);
	const used = new Set(rows.flatMap(({ code }) => code ?? []));
	return newReplyCode(used, () => randomInt(FINENESS) / FINENESS);
}
