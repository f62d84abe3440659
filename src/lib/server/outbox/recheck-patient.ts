import { and, eq } from 'drizzle-orm';
import { isWithinHours, nextWithinHours } from '$lib/domain/core/hours';
import { messageLanguage } from '$lib/domain/messages/templates/wording';
import { isExpected } from '$lib/domain/visits/states';
import { judgeReminder, REMINDER_HOURS } from '$lib/domain/visits/reminders';
import type { Reader } from '../db';
import { episodes, patientLinks, patients, reminders, visits } from '../db/schema';
import { stopHeardKey } from '../messages/understood';
import { newsKey } from '../visits/tell-patient';
import type { OutboxRow } from './change';
import { skip, type Verdict } from './verdict';

type PatientRow = typeof patients.$inferSelect;

/** A reminder: is the visit still as it tells, is it daytime, and may the patient be written to? */
export async function recheckReminder(reader: Reader, row: OutboxRow, now: number): Promise<Verdict> {
	const [visit] = await reader.select().from(visits).where(eq(visits.id, row.refId));
	const [planned] = await reader.select().from(reminders).where(eq(reminders.messageId, row.id));
	const patient = await patientOf(reader, row);
	if (!visit || !patient) {
		return skip('nobody to send to');
	}
	const verdict = judgeReminder(
		{
			state: visit.state,
			startsAt: visit.startsAt,
			upToDate: planned === undefined || planned.sequence === visit.sequence,
			expiresAt: row.expiresAt,
			hasPhone: patient.phone !== null,
			consented: patient.smsConsent,
			optedOut: patient.smsOptedOutAt !== null,
			patientZone: patient.zone
		},
		now
	);
	return verdict.kind === 'send' ? toPatient(patient) : verdict;
}

/**
 * News of a visit: only as long as nothing newer is true. What nobody could send in time is for a person to tell.
 */
export async function recheckNews(reader: Reader, row: OutboxRow, now: number): Promise<Verdict> {
	const patient = await patientOf(reader, row);
	if (!patient) {
		return skip('nobody to send to');
	}
	if (row.refKind === 'visit') {
		const [visit] = await reader.select().from(visits).where(eq(visits.id, row.refId));
		if (!visit || row.causeKey !== newsKey(visit, row.channel)) {
			return skip('visit has moved');
		}
		if (!isExpected(visit.state) && visit.state !== 'cancelled') {
			return skip('visit is over or cancelled');
		}
	}
	return toPatientIfAllowed(patient, row, now);
}

/** The link of a patient's page: only as long as it opens the page. */
export async function recheckPageLink(reader: Reader, row: OutboxRow, now: number): Promise<Verdict> {
	const [link] =
		row.linkId === null
			? []
			: await reader.select().from(patientLinks).where(eq(patientLinks.id, row.linkId));
	const patient = await patientOf(reader, row);
	if (!link || link.revokedAt !== null || link.expiresAt <= now) {
		return skip('link used, expired or not theirs');
	}
	return patient ? toPatientIfAllowed(patient, row, now) : skip('nobody to send to');
}

/**
 * Answers need no consent: they go to somebody who has just written, and tell nothing. After STOP one last text may
 * go, the one that says that it was heard.
 */
export async function recheckAnswer(reader: Reader, row: OutboxRow): Promise<Verdict | null> {
	const patient = await patientOf(reader, row);
	if (!patient) {
		return null;
	}
	const { smsOptedOutAt } = patient;
	const last = smsOptedOutAt !== null && row.causeKey === stopHeardKey(patient.id, smsOptedOutAt);
	return smsOptedOutAt === null || last ? toPatient(patient) : skip('opted out');
}

/**
 * By text with consent and at daytime, by mail with consent. What comes too late is for a person to see to, and what
 * could only wait until it is too late already now.
 */
function toPatientIfAllowed(patient: PatientRow, row: OutboxRow, now: number): Verdict {
	const verdict = row.channel === 'sms' ? byText(patient, now) : byMail(patient);
	const at = verdict.kind === 'wait' ? verdict.until : now;
	return verdict.kind !== 'skip' && at >= row.expiresAt ? { kind: 'fail', reason: 'expired' } : verdict;
}

function byText(patient: PatientRow, now: number): Verdict {
	if (patient.smsOptedOutAt !== null) {
		return skip('opted out');
	}
	if (!patient.smsConsent) {
		return skip('no consent');
	}
	return isWithinHours(now, patient.zone, REMINDER_HOURS)
		? toPatient(patient)
		: { kind: 'wait', until: nextWithinHours(now, patient.zone, REMINDER_HOURS) };
}

function byMail({ email, mailConsent, name, language }: PatientRow): Verdict {
	if (email === null) {
		return skip('no e-mail address');
	}
	return mailConsent
		? { kind: 'send', receiver: { to: email, name, language: messageLanguage(language) } }
		: skip('no consent');
}

/** Whom a message is for; null for nobody, and for a patient who has died: whatever waits, it is not sent to them. */
async function patientOf(reader: Reader, { patientId }: OutboxRow): Promise<PatientRow | null> {
	if (patientId === null) {
		return null;
	}
	const [patient] = await reader.select().from(patients).where(eq(patients.id, patientId));
	const died = and(eq(episodes.patientId, patientId), eq(episodes.closedFor, 'died'));
	return patient && (await reader.$count(episodes, died)) === 0 ? patient : null;
}

function toPatient({ phone }: PatientRow): Verdict {
	return phone === null ? skip('no telephone number') : { kind: 'send', receiver: { to: phone, name: null } };
}
