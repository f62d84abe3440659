import { calendarFile, type CalendarMethod } from '$lib/domain/visits/calendar';
import { messageLanguage } from '$lib/domain/messages/templates/wording';
import type { patients, visits } from '../db/schema';
import { env } from '../env';
import { readSender } from '../outbox/channels/mail-address';

type VisitRow = typeof visits.$inferSelect;
type PatientRow = typeof patients.$inferSelect;

/** Visits as a calendar file for their patient, asked by mail where it is a request or a cancellation. */
export function calendarOf(
	rows: readonly VisitRow[],
	method: CalendarMethod,
	{ email, language }: Pick<PatientRow, 'email' | 'language'>,
	now: number
): string {
	const { hospital, mailFrom } = env();
	const entries = rows.map((row) => ({ ...row, cancelled: row.state === 'cancelled' }));
	return calendarFile(entries, {
		method,
		now,
		sender: hospital.name,
		phone: hospital.phone,
		language: messageLanguage(language),
		organizer: readSender(mailFrom).address,
		attendee: method === 'PUBLISH' ? null : email
	});
}
