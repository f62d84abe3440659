import { HOUR } from '$lib/domain/core/time';
import { nextWithinHours } from '$lib/domain/core/hours';
import { mailProblem, textProblem } from '$lib/domain/messages/reach';
import { mailText, smsText } from '$lib/domain/messages/templates';
import { REMINDER_HOURS } from '$lib/domain/visits/reminders';
import type { patients, visits } from '../db/schema';
import { env } from '../env';
import type { NewMessage } from '../outbox/enqueue';
import { calendarOf } from './calendar';

type VisitRow = typeof visits.$inferSelect;
type PatientRow = typeof patients.$inferSelect;

/** What has not arrived by then is for a person to tell. */
const NEWS_LIFE_MS = 24 * HOUR;

/** The ways by which a patient is told of a change. */
export type Way = NewMessage['channel'];

/** Names the news that a visit is as it is now; what is named by an earlier sequence is not true any more. */
export function newsKey({ id, sequence }: Pick<VisitRow, 'id' | 'sequence'>, way: Way): string {
	return `visit-news:${id}:${sequence}:${way}`;
}

/** A single visit is booked: a mail with its calendar file, where the patient wants mail. Texts are left to reminders. */
export function tellBooked(booked: readonly VisitRow[], patient: PatientRow, now: number): NewMessage[] {
	const [first] = booked;
	if (!first || mailProblem(patient) !== null) {
		return [];
	}
	if (booked.length === 1) {
		return mailOf(first, patient, 'visit-booked', now);
	}
	const fields = { ...senderFields(), count: booked.length };
	const { subject, text } = mailText('series-booked', fields, patient.language);
	return [
		{
			kind: 'visit',
			channel: 'mail',
			causeKey: `visit-series:${first.seriesId}`,
			patientId: patient.id,
			subject,
			body: text,
			calendar: calendarOf(booked, 'PUBLISH', patient, now),
			ref: { kind: 'episode', id: first.episodeId },
			expiresAt: now + NEWS_LIFE_MS
		}
	];
}

/**
 * The visit has another time or place now.
 * @param before when it was to begin: after that a text comes too late
 */
export function tellMoved(visit: VisitRow, before: number, patient: PatientRow, now: number): NewMessage[] {
	const useful = Math.min(before, visit.startsAt);
	return [
		...textOf(visit, patient, 'visit-moved', useful, now),
		...mailOf(visit, patient, 'visit-moved', now)
	];
}

/** The visit is cancelled. Who cancelled it themselves by text or on their page is not told again by text. */
export function tellCancelled(
	visit: VisitRow,
	by: 'staff' | 'patient',
	patient: PatientRow,
	now: number
): NewMessage[] {
	const text = by === 'staff' ? textOf(visit, patient, 'visit-cancelled', visit.startsAt, now) : [];
	return [...text, ...mailOf(visit, patient, 'visit-cancelled', now)];
}

/** The visit takes longer or shorter, at its time and place: news for a calendar, and no reason for a text. */
export function tellLength(visit: VisitRow, patient: PatientRow, now: number): NewMessage[] {
	return mailOf(visit, patient, 'visit-length', now);
}

/** The visit is as it was agreed, and calendars that hold another instant for it are told this one. */
export function tellAnew(visit: VisitRow, patient: PatientRow, now: number): NewMessage[] {
	return mailOf(visit, patient, 'visit-booked', now);
}

/**
 * All these visits are cancelled at once: one text, which tells the next of them, and one mail, which lists them. Its
 * file publishes them as cancelled, because a cancellation by RFC 5546 is about one visit alone.
 */
export function tellAllCancelled(
	cancelled: readonly VisitRow[],
	patient: PatientRow,
	now: number
): NewMessage[] {
	const [first, ...more] = cancelled;
	if (!first || more.length === 0) {
		return first ? tellCancelled(first, 'staff', patient, now) : [];
	}
	const about = { ref: { kind: 'episode' as const, id: first.episodeId }, patientId: patient.id };
	const causeKey = (way: Way) => `visits-cancelled:${first.id}:${first.sequence}:${way}`;
	const texts = textOf(first, patient, 'visits-cancelled', first.startsAt, now);
	const mails = mailProblem(patient) === null ? [listMail(cancelled, patient, now)] : [];
	return [...texts, ...mails].map((news) => ({ ...news, ...about, causeKey: causeKey(news.channel) }));
}

function listMail(cancelled: readonly VisitRow[], patient: PatientRow, now: number) {
	const fields = { ...senderFields(), visits: cancelled.map(whenAndWhere) };
	const { subject, text } = mailText('visits-cancelled', fields, patient.language);
	return {
		kind: 'visit' as const,
		channel: 'mail' as const,
		subject,
		body: text,
		calendar: calendarOf(cancelled, 'PUBLISH', patient, now),
		expiresAt: now + NEWS_LIFE_MS
	};
}

/** By which ways messages go. */
export function waysOf(messages: readonly NewMessage[]): Way[] {
	return messages.map(({ channel }) => channel);
}

/** A text, at daytime; none where it could only come too late, because somebody then has to call. */
function textOf(
	visit: VisitRow,
	patient: PatientRow,
	template: 'visit-moved' | 'visit-cancelled' | 'visits-cancelled',
	useful: number,
	now: number
): NewMessage[] {
	const notBefore = nextWithinHours(now, patient.zone, REMINDER_HOURS);
	if (textProblem(patient) !== null || notBefore >= useful) {
		return [];
	}
	return [
		{
			...newsAbout(visit, patient, 'sms'),
			body: smsText(template, { ...senderFields(), ...whenAndWhere(visit) }, patient.language),
			notBefore,
			expiresAt: Math.min(useful, notBefore + NEWS_LIFE_MS)
		}
	];
}

function mailOf(
	visit: VisitRow,
	patient: PatientRow,
	template: 'visit-booked' | 'visit-moved' | 'visit-length' | 'visit-cancelled',
	now: number
): NewMessage[] {
	if (mailProblem(patient) !== null || visit.startsAt <= now) {
		return [];
	}
	const { subject, text } = mailText(
		template,
		{ ...senderFields(), ...whenAndWhere(visit), minutes: visit.minutes },
		patient.language
	);
	const method = template === 'visit-cancelled' ? 'CANCEL' : 'REQUEST';
	return [
		{
			...newsAbout(visit, patient, 'mail'),
			subject,
			body: text,
			calendar: calendarOf([visit], method, patient, now),
			expiresAt: Math.min(visit.startsAt, now + NEWS_LIFE_MS)
		}
	];
}

function newsAbout(visit: VisitRow, patient: PatientRow, channel: Way) {
	return {
		kind: 'visit' as const,
		channel,
		causeKey: newsKey(visit, channel),
		patientId: patient.id,
		ref: { kind: 'visit' as const, id: visit.id }
	};
}

function whenAndWhere({ startsAt, zone, place }: VisitRow) {
	return { startsAt, zone, place };
}

function senderFields() {
	const { name, phone } = env().hospital;
	return { sender: name, phone };
}
