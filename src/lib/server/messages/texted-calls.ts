import { and, eq, gt, isNotNull, ne, or, sql } from 'drizzle-orm';
import type { Reader } from '../db';
import { escalations, outbox } from '../db/schema';
import { LINK_LIFE_MS } from '../escalations/tell';

/** The call that a reply without a code means; 'several' where it may be to the text of another. */
export type MeantCall = 'none' | 'several' | { id: string; code: string | null };

/**
 * Which call a reply without a code is to. A call that somebody else has meanwhile counts as well: whoever answers
 * its text does not mean the call of another bed that still waits.
 */
export async function meantCall(reader: Reader, userId: string, now: number): Promise<MeantCall> {
	const texted = await textedCalls(reader, userId, now);
	const [waiting] = texted.filter(({ waits }) => waits);
	if (!waiting) {
		return 'none';
	}
	return texted.length > 1 ? 'several' : { id: waiting.id, code: waiting.code };
}

/** The calls that were texted to this person, or may have been, while their links live; and whether each waits. */
async function textedCalls(reader: Reader, userId: string, now: number) {
	const mayHaveArrived = or(isNotNull(outbox.sentAt), gt(outbox.attempts, 0), eq(outbox.state, 'sending'));
	const waits = or(
		eq(escalations.state, 'raised'),
		and(eq(escalations.state, 'taken'), isNotNull(escalations.nextStepAt), ne(escalations.takenBy, userId)),
		and(eq(escalations.state, 'taken'), eq(escalations.passTo, userId))
	);
	return reader
		.selectDistinct({
			id: escalations.id,
			code: escalations.replyCode,
			waits: sql`coalesce(${waits}, 0)`.mapWith(Boolean)
		})
		.from(outbox)
		.innerJoin(escalations, eq(escalations.id, outbox.refId))
		.where(
			and(
				eq(outbox.kind, 'escalation'),
				eq(outbox.userId, userId),
				gt(outbox.createdAt, now - LINK_LIFE_MS),
				mayHaveArrived
			)
		);
}
