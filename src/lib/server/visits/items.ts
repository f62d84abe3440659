import { and, asc, eq, inArray, or, sql } from 'drizzle-orm';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { VisitLine } from '$lib/domain/episodes/views';
import { textProblem } from '$lib/domain/messages/reach';
import { isExpected } from '$lib/domain/visits/states';
import type { NoReminder, PatientAnswer, ReminderFate, VisitItem } from '$lib/domain/visits/views';
import { db, type Reader } from '../db';
import { inboundMessages, outbox, reminders, visits, type patients } from '../db/schema';
import { patientLine } from '../episodes/list';
import { closedNames } from './closed-days';

type VisitRow = typeof visits.$inferSelect;
type PatientRow = typeof patients.$inferSelect;

/** A visit as it stands on the nameboard. */
export function visitLine({ id, startsAt, minutes, place, state }: VisitRow): VisitLine {
	return { id, startsAt: toRfc3339(startsAt), minutes, place, state };
}

/** Visits with their patient, what became of the reminders, and what the patient answered. */
export async function visitItems(
	rows: readonly { visit: VisitRow; patient: PatientRow }[]
): Promise<VisitItem[]> {
	const ids = rows.map(({ visit }) => visit.id);
	const [fates, answers, closed] = await Promise.all([
		fatesOf(db(), ids),
		answersOf(db(), ids),
		closedNames(
			db(),
			rows.map(({ visit }) => visit)
		)
	]);
	return rows.map(({ visit, patient }) => ({
		...visitLine(visit),
		closedDay: closed.get(visit.id) ?? null,
		episodeId: visit.episodeId,
		patient: patientLine(patient),
		unitId: visit.unitId,
		reason: visit.reason,
		wantsFollowUp: visit.patientCancelledAt !== null && visit.followedUpAt === null,
		sequence: visit.sequence,
		noReminder: noReminder(visit, patient, fates.get(visit.id) ?? []),
		seriesId: visit.seriesId,
		reminders: fates.get(visit.id) ?? [],
		answer: answers.get(visit.id) ?? null
	}));
}

/** Why nothing will remind of a visit that is expected: said before it shows in what was not sent. */
function noReminder(visit: VisitRow, patient: PatientRow, fates: readonly ReminderFate[]): NoReminder | null {
	if (!isExpected(visit.state)) {
		return null;
	}
	if (fates.length === 0) {
		return 'too-late-for-one';
	}
	return fates.every(({ state }) => state === 'ready' || state === 'held') ? textProblem(patient) : null;
}

async function fatesOf(reader: Reader, visitIds: string[]): Promise<Map<string, ReminderFate[]>> {
	// A cancellation raises the sequence and moves nothing: the reminders of the time that it ended are its history.
	const tellsOf = or(
		eq(reminders.sequence, visits.sequence),
		and(eq(visits.state, 'cancelled'), eq(reminders.sequence, sql`${visits.sequence} - 1`))
	);
	const rows = await reader
		.select({
			visitId: reminders.visitId,
			dueAt: reminders.dueAt,
			state: outbox.state,
			reason: outbox.stateReason,
			sentAt: outbox.sentAt
		})
		.from(reminders)
		.innerJoin(outbox, eq(outbox.id, reminders.messageId))
		.innerJoin(visits, and(eq(visits.id, reminders.visitId), tellsOf))
		.where(inArray(reminders.visitId, visitIds))
		.orderBy(asc(reminders.dueAt));
	const fates = new Map<string, ReminderFate[]>();
	for (const { visitId, dueAt, state, reason, sentAt } of rows) {
		const fate = {
			dueAt: toRfc3339(dueAt),
			state,
			reason,
			sentAt: sentAt === null ? null : toRfc3339(sentAt)
		};
		fates.set(visitId, [...(fates.get(visitId) ?? []), fate]);
	}
	return fates;
}

/** The last yes or no that each visit had by text. */
async function answersOf(reader: Reader, visitIds: string[]): Promise<Map<string, PatientAnswer>> {
	const rows = await reader
		.select({
			visitId: inboundMessages.visitId,
			at: inboundMessages.at,
			word: inboundMessages.understoodAs
		})
		.from(inboundMessages)
		.where(
			and(inArray(inboundMessages.visitId, visitIds), inArray(inboundMessages.understoodAs, ['yes', 'no']))
		)
		.orderBy(asc(inboundMessages.at));
	return new Map(
		rows.map(({ visitId, at, word }) => [visitId ?? '', { at: toRfc3339(at), yes: word === 'yes' }])
	);
}
