import { and, asc, desc, eq, gt, inArray, isNotNull, ne, or, sql } from 'drizzle-orm';
import { isExpected } from '$lib/domain/visits/states';
import type { Reader } from '../db';
import { episodes, outbox, reminders, visits } from '../db/schema';
import type { VisitRow } from '../visits/move';

/** A text that has left, or may have. */
const mayHaveArrived = or(isNotNull(outbox.sentAt), gt(outbox.attempts, 0), eq(outbox.state, 'sending'));
const leftAt = sql<number>`coalesce(${outbox.sentAt}, ${outbox.nextAt})`;

export interface ToldVisit {
	visit: VisitRow;
	toldAt: number;
}

/**
 * The expected visits ahead whose time a text has told, or may have: the one of the newest text first, because that
 * is what an answer is to; of those told at once the next.
 */
export async function toldVisits(reader: Reader, patientId: string, now: number): Promise<ToldVisit[]> {
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

/** A text about a visit that a patient has, or may have. */
export interface VisitText {
	/** The visit, or the stay where it told of all of its visits at once. */
	about: string;
	/** The visit as it is now, whatever became of it; null where the text told of several. */
	visit: VisitRow | null;
	at: number;
}

/** So many texts of one hour are looked through for the visits that they told of. */
const TEXTS_LOOKED_AT = 20;

/** The newest texts to a patient about visits, whatever those are now: an answer is to the first of them. */
export async function textsOfVisits(reader: Reader, patientId: string): Promise<VisitText[]> {
	return reader
		.select({ about: outbox.refId, visit: visits, at: leftAt })
		.from(outbox)
		.leftJoin(visits, and(eq(outbox.refKind, 'visit'), eq(visits.id, outbox.refId)))
		.where(
			and(
				eq(outbox.patientId, patientId),
				eq(outbox.channel, 'sms'),
				inArray(outbox.kind, ['reminder', 'visit']),
				mayHaveArrived
			)
		)
		.orderBy(desc(leftAt), desc(outbox.id))
		.limit(TEXTS_LOOKED_AT);
}

/**
 * Whether the newest text to a patient asked something: a reminder, or the new time of a visit that stands. Our answers
 * are passed over: whoever has asked for help and then says 'ok' still answers what was asked before.
 */
export async function newestTextAsks(reader: Reader, patientId: string): Promise<boolean> {
	const [newest] = await reader
		.select({ kind: outbox.kind, state: visits.state })
		.from(outbox)
		.leftJoin(visits, and(eq(outbox.refKind, 'visit'), eq(visits.id, outbox.refId)))
		.where(
			and(
				eq(outbox.patientId, patientId),
				eq(outbox.channel, 'sms'),
				ne(outbox.kind, 'answer'),
				mayHaveArrived
			)
		)
		.orderBy(desc(leftAt), desc(outbox.id))
		.limit(1);
	const asks = newest?.kind === 'reminder' || newest?.kind === 'visit';
	return asks && newest.state !== null && isExpected(newest.state);
}
