/**
 * Visits as a calendar file, RFC 5545 and RFC 5546: for the mail to a patient and for the file of their own page.
 * It tells when, where and whom to call, and nothing about the patient.
 *
 * Times are in UTC, which every calendar shows in its own zone. A visit keeps its identifier for ever; of two
 * entries with the same one the higher sequence counts, so a change finds what it changes.
 */
import { MINUTE, type Instant } from '../core/time';
import { placeName, senderName } from '../messages/templates/frame';
import type { MessageLanguage } from '../messages/templates/wording';
import { escapeText, fileOf, quoted, utcStamp } from './calendar-text';

/**
 * `REQUEST` asks the one whom it is sent to and answers to one visit; `CANCEL` calls it off; `PUBLISH` may hold
 * several, for a series and for the page.
 */
export type CalendarMethod = 'REQUEST' | 'CANCEL' | 'PUBLISH';

export interface CalendarVisit {
	readonly id: string;
	readonly sequence: number;
	readonly startsAt: Instant;
	readonly minutes: number;
	readonly place: string;
	/** Called off; in a file that publishes several, one may be and the next not. */
	readonly cancelled?: boolean;
}

export interface CalendarFrame {
	readonly method: CalendarMethod;
	/** When the file is written. */
	readonly now: Instant;
	readonly sender: string;
	readonly phone: string;
	readonly language: MessageLanguage;
	/** The hospital's own address. */
	readonly organizer: string;
	/** Whom it is sent to; null for a file that nobody is asked by. */
	readonly attendee: string | null;
}

const WORDS: Record<MessageLanguage, { visit: (sender: string) => string; call: (phone: string) => string }> =
	{
		en: {
			visit: (sender) => `Visit, ${sender}`,
			call: (phone) => `To change it, or if you cannot come, call ${phone}.`
		},
		es: {
			visit: (sender) => `Cita, ${sender}`,
			call: (phone) => `Para cambiarla o si no puede venir, llame al ${phone}.`
		}
	};

/**
 * The identifier of a visit in calendars. It holds no address of the product, because that can change and the
 * identifier must not.
 */
export function calendarId(visitId: string): string {
	return `visit-${visitId}@ropewalk`;
}

/**
 * The calendar file of some visits.
 * @throws RangeError for none, because RFC 5545 wants one at least, and for a request or a cancellation of several,
 * because RFC 5546 allows one
 */
export function calendarFile(visits: readonly CalendarVisit[], frame: CalendarFrame): string {
	if (visits.length === 0) {
		throw new RangeError('A calendar file is about one visit at least, not 0.');
	}
	if (frame.method !== 'PUBLISH' && visits.length !== 1) {
		throw new RangeError(
			`A calendar file with the method ${frame.method} is about one visit, not ${visits.length}.`
		);
	}
	return fileOf([
		'BEGIN:VCALENDAR',
		'VERSION:2.0',
		'PRODID:-//Ropewalk//Visits//EN',
		'CALSCALE:GREGORIAN',
		`METHOD:${frame.method}`,
		...visits.flatMap((visit) => eventOf(visit, frame)),
		'END:VCALENDAR'
	]);
}

/** The method that a file of ours states; null for what is none. */
export function methodOf(file: string): CalendarMethod | null {
	const stated = /^METHOD:(REQUEST|CANCEL|PUBLISH)\r$/m.exec(file)?.[1];
	return (stated as CalendarMethod | undefined) ?? null;
}

function eventOf(visit: CalendarVisit, frame: CalendarFrame): string[] {
	const { method, now, language, organizer, attendee } = frame;
	const cancelled = method === 'CANCEL' || visit.cancelled === true;
	const sender = senderName(frame, language);
	const words = WORDS[language];
	return [
		'BEGIN:VEVENT',
		`UID:${calendarId(visit.id)}`,
		`DTSTAMP:${utcStamp(now)}`,
		`SEQUENCE:${visit.sequence}`,
		`DTSTART:${utcStamp(visit.startsAt)}`,
		`DTEND:${utcStamp(visit.startsAt + visit.minutes * MINUTE)}`,
		`SUMMARY:${escapeText(words.visit(sender))}`,
		`LOCATION:${escapeText(placeName(visit, language))}`,
		`DESCRIPTION:${escapeText(words.call(frame.phone))}`,
		`STATUS:${cancelled ? 'CANCELLED' : 'CONFIRMED'}`,
		`ORGANIZER;CN=${quoted(sender)}:mailto:${organizer}`,
		...(attendee === null
			? []
			: [`ATTENDEE;ROLE=REQ-PARTICIPANT;PARTSTAT=NEEDS-ACTION;RSVP=FALSE:mailto:${attendee}`]),
		`TRANSP:${cancelled ? 'TRANSPARENT' : 'OPAQUE'}`,
		'END:VEVENT'
	];
}
