import { and, eq, gt, inArray } from 'drizzle-orm';
import { planReminders } from '$lib/domain/visits/reminders';
import type { LiveEvent } from '$lib/domain/live/events';
import type { Tx } from '../db';
import { outbox, reminders, visits, type patients } from '../db/schema';
import { messageEvent } from '../outbox/change';
import { reminderText } from './remind';
import { newsKey } from './tell-patient';

type PatientRow = typeof patients.$inferSelect;

/** Let what was dropped with a mark wait again: the reminders, and the news of a move that nobody had sent. */
export async function reviveWaiting(
	tx: Tx,
	patient: PatientRow,
	visit: typeof visits.$inferSelect,
	now: number
): Promise<LiveEvent[]> {
	return [...(await reviveNews(tx, visit, now)), ...(await reviveReminders(tx, patient, visit, now))];
}

/** Its key names the sequence, so that news of an earlier time stay dropped. */
async function reviveNews(tx: Tx, visit: typeof visits.$inferSelect, now: number): Promise<LiveEvent[]> {
	const revived = await tx
		.update(outbox)
		.set({ state: 'ready', stateReason: null })
		.where(
			and(
				inArray(outbox.causeKey, [newsKey(visit, 'sms'), newsKey(visit, 'mail')]),
				eq(outbox.state, 'cancelled'),
				eq(outbox.attempts, 0),
				gt(outbox.expiresAt, now)
			)
		)
		.returning();
	return Promise.all(revived.map((row) => messageEvent(tx, row, 'ready')));
}

/**
 * Let the reminders of a visit that was marked by mistake wait again, asking as before: those that were dropped with
 * the mark, that nobody had tried to send, and whose hour is still to come.
 */
async function reviveReminders(
	tx: Tx,
	patient: PatientRow,
	visit: typeof visits.$inferSelect,
	now: number
): Promise<LiveEvent[]> {
	const dropped = await untried(tx, patient.id, visit.id, ['cancelled']);
	const planned = planOf(visit, patient, now);
	const events: LiveEvent[] = [];
	for (const { id, causeKey } of dropped) {
		const again = planned.find(({ kind }) => causeKey.endsWith(`:${kind}`));
		if (again) {
			const { dueAt: nextAt, expiresAt } = again;
			const body = reminderText(visit, patient, false);
			const [row] = await tx
				.update(outbox)
				.set({ state: 'ready', stateReason: null, nextAt, expiresAt, body })
				.where(eq(outbox.id, id))
				.returning();
			events.push(...(row ? [await messageEvent(tx, row, 'ready')] : []));
		}
	}
	return events;
}

function planOf(visit: typeof visits.$inferSelect, patient: PatientRow, now: number) {
	return planReminders(
		{ startsAt: visit.startsAt, inSeries: visit.seriesId !== null },
		{ zone: visit.zone, patientZone: patient.zone, now }
	);
}

/**
 * The reminders of a patient that nobody has tried to send, each with its visit as it is now. One that was tried keeps
 * its words and its hour, because by its words the gateway is asked whether it has gone through.
 */
function untried(
	tx: Tx,
	patientId: string,
	visitId?: string,
	states: (typeof outbox.$inferSelect)['state'][] = ['ready', 'held']
) {
	return tx
		.select({ id: outbox.id, causeKey: outbox.causeKey, visit: visits })
		.from(outbox)
		.innerJoin(reminders, eq(reminders.messageId, outbox.id))
		.innerJoin(visits, and(eq(visits.id, reminders.visitId), eq(visits.sequence, reminders.sequence)))
		.where(
			and(
				eq(outbox.patientId, patientId),
				eq(outbox.kind, 'reminder'),
				inArray(outbox.state, states),
				eq(outbox.attempts, 0),
				visitId === undefined ? undefined : eq(visits.id, visitId)
			)
		);
}

/**
 * Give waiting reminders the words that fit now: who has said yes is not asked again, and who reads another language
 * gets it.
 * @param visitId of this visit alone; of all that are ahead where left out
 */
export async function rewordReminders(tx: Tx, patient: PatientRow, visitId?: string): Promise<void> {
	for (const { id, visit } of await untried(tx, patient.id, visitId)) {
		const body = reminderText(visit, patient, visit.state === 'confirmed');
		await tx.update(outbox).set({ body }).where(eq(outbox.id, id));
	}
}

/**
 * Give waiting reminders the hours that fit the patient's zone. What has no hour there any more keeps its own: it is
 * judged by that zone when it is due.
 */
export async function replanReminders(tx: Tx, patient: PatientRow, now: number): Promise<void> {
	for (const { id, causeKey, visit } of await untried(tx, patient.id)) {
		const planned = planOf(visit, patient, now).find(({ kind }) => causeKey.endsWith(`:${kind}`));
		if (planned) {
			const { dueAt, expiresAt } = planned;
			await tx.update(outbox).set({ nextAt: dueAt, expiresAt }).where(eq(outbox.id, id));
			await tx.update(reminders).set({ dueAt }).where(eq(reminders.messageId, id));
		}
	}
}

/**
 * What was told of a visit holds under its new sequence too: a yes to it counts, and what waits still goes. Its time
 * and place are the same.
 */
export async function carryReminders(
	tx: Tx,
	{ id, sequence }: { id: string; sequence: number },
	to: number
): Promise<void> {
	await tx
		.update(reminders)
		.set({ sequence: to })
		.where(and(eq(reminders.visitId, id), eq(reminders.sequence, sequence)));
	await tx
		.update(outbox)
		.set({ causeKey: newsKey({ id, sequence: to }, 'sms') })
		.where(eq(outbox.causeKey, newsKey({ id, sequence }, 'sms')));
}
