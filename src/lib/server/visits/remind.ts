import { eq } from 'drizzle-orm';
import { smsText } from '$lib/domain/messages/templates';
import { planReminders } from '$lib/domain/visits/reminders';
import type { Reader, Tx } from '../db';
import { episodes, patients, reminders, type visits } from '../db/schema';
import { env } from '../env';
import { newId } from '../ids';
import type { NewMessage } from '../outbox/enqueue';

type VisitRow = typeof visits.$inferSelect;
type PatientRow = typeof patients.$inferSelect;

export async function patientOfEpisode(tx: Reader, episodeId: string): Promise<PatientRow> {
	const [row] = await tx
		.select({ patient: patients })
		.from(patients)
		.innerJoin(episodes, eq(episodes.patientId, patients.id))
		.where(eq(episodes.id, episodeId));
	if (!row) {
		throw new Error(`Episode ${episodeId} has no patient.`);
	}
	return row.patient;
}

/**
 * Plan the reminders of a visit that was just booked or moved: their rows here, their messages for the outbox. Consent,
 * number and hours are looked at when they are due, because all three can change until then.
 */
export async function remindOf(
	tx: Tx,
	visit: VisitRow,
	patient: PatientRow,
	now: number
): Promise<NewMessage[]> {
	const planned = planReminders(
		{ startsAt: visit.startsAt, inSeries: visit.seriesId !== null },
		{ zone: visit.zone, patientZone: patient.zone, now }
	);
	const body = reminderText(visit, patient, false);
	const messages: NewMessage[] = [];
	for (const { kind, dueAt, expiresAt } of planned) {
		const messageId = newId();
		const { id: visitId, sequence } = visit;
		await tx.insert(reminders).values({ id: newId(), visitId, dueAt, sequence, messageId });
		messages.push({
			id: messageId,
			kind: 'reminder',
			channel: 'sms',
			causeKey: `reminder:${visitId}:${sequence}:${kind}`,
			patientId: patient.id,
			body,
			ref: { kind: 'visit', id: visit.id },
			notBefore: dueAt,
			expiresAt
		});
	}
	return messages;
}

/** The text of a reminder; a patient who has said yes is not asked again. */
export function reminderText(
	{ startsAt, zone, place }: VisitRow,
	{ language }: PatientRow,
	confirmed: boolean
): string {
	const { name, phone } = env().hospital;
	return smsText('visit-reminder', { sender: name, phone, startsAt, zone, place, confirmed }, language);
}
