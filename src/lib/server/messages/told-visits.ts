import { and, asc, desc, eq, gt, inArray, isNotNull, or, sql } from 'drizzle-orm';
import { isExpected } from '$lib/domain/visits/states';
import type { Reader } from '../db';
import { episodes, outbox, reminders, visits } from '../db/schema';
import type { VisitRow } from '../visits/move';

/** A text that has left, or may have. */
const mayHaveArrived = or(isNotNull(outbox.sentAt), gt(outbox.attempts, 0), eq(outbox.state, 'sending'));
const leftAt = sql<number>`coalesce(${outbox.sentAt}, ${outbox.nextAt})`;

/**
 * The expected visits ahead whose time a text has told, or may have: the one of the newest text first, because that
 * is what an answer is to; of those told at once the next.
 */
export async function toldVisits(
	reader: Reader,
	patientId: string,
	now: number
): Promise<{ visit: VisitRow; toldAt: number }[]> {
	// A yes to the old time of a visit is none to the new one, which the news or a reminder of its own has told.
	const tellsHowItIs = or(
		eq(reminders.sequence, visits.sequence),
		eq(outbox.causeKey, sql`'visit-news:' || ${visits.id} || ':' || ${visits.sequence} || ':sms'`)
	);
	const toldAt = sql<number>`max(${leftAt})`;
	return reader
		.select({ visit: visits, toldAt })
		.from(visits)
		.innerJoin(episodes, eq(episodes.id, visits.episodeId))
		.innerJoin(outbox, and(eq(outbox.refKind, 'visit'), eq(outbox.refId, visits.id)))
		.leftJoin(reminders, eq(reminders.messageId, outbox.id))
		.where(
			and(
				eq(episodes.patientId, patientId),
				inArray(visits.state, ['planned', 'confirmed']),
				gt(visits.startsAt, now),
				tellsHowItIs,
				mayHaveArrived
			)
		)
		.groupBy(visits.id)
		.orderBy(desc(toldAt), asc(visits.startsAt), asc(visits.id));
}

/** Whether the newest text to a patient asked something: a reminder, or the new time of a visit that stands. */
export async function newestTextAsks(reader: Reader, patientId: string): Promise<boolean> {
	const [newest] = await reader
		.select({ kind: outbox.kind, state: visits.state })
		.from(outbox)
		.leftJoin(visits, and(eq(outbox.refKind, 'visit'), eq(visits.id, outbox.refId)))
		.where(and(eq(outbox.patientId, patientId), eq(outbox.channel, 'sms'), mayHaveArrived))
		.orderBy(desc(leftAt), desc(outbox.id))
		.limit(1);
	const asks = newest?.kind === 'reminder' || newest?.kind === 'visit';
	return asks && newest.state !== null && isExpected(newest.state);
}
