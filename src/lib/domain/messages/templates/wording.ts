/** What all templates share: languages, names that are safe to send, and days in words. */
import type { Grade } from '../../core/codes';
import { localParts, WEEKDAYS } from '../../core/time';
import type { Instant, Zone } from '../../core/time';
import { deniedWords } from '../deny-list';
import { isGsm7, toGsm7 } from '../gsm7';
import { isOneSegment, measureSms } from '../sms-length';

export const PRODUCT = 'Ropewalk';

/** A further language adds its code here, and the compiler then asks for its wording in every text to patients. */
export const MESSAGE_LANGUAGES = ['en', 'es'] as const;
export type MessageLanguage = (typeof MESSAGE_LANGUAGES)[number];

/** The wording of a text to patients: all languages side by side, so that none is forgotten. */
export type Wording<Fields, Text = string> = Record<MessageLanguage, (fields: Fields) => Text>;
/** The wording of a text to staff, who are written to in the hospital's own language. */
export type StaffWording<Fields, Text = string> = { readonly en: (fields: Fields) => Text };

/** The language to write to somebody in; English where theirs is not there. `en-IE` counts as `en`. */
export function messageLanguage(language: string | null): MessageLanguage {
	const wanted = language?.toLowerCase().split(/[-_]/)[0];
	return MESSAGE_LANGUAGES.find((known) => known === wanted) ?? 'en';
}

export const GRADE_WORDS: Record<Grade, string> = { high: 'HIGH', medium: 'MEDIUM', low: 'LOW' };

/** Without the accents that the alphabet of texts lacks. */
const WEEKDAY_WORDS: Record<MessageLanguage, readonly string[]> = {
	en: ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'],
	es: ['lun', 'mar', 'mie', 'jue', 'vie', 'sab', 'dom']
};
const MONTH_WORDS: Record<MessageLanguage, readonly string[]> = {
	en: ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'],
	es: ['ene', 'feb', 'mar', 'abr', 'may', 'jun', 'jul', 'ago', 'sep', 'oct', 'nov', 'dic']
};

/** `Fri 28 Mar 10:00`, in the zone of the place one has to come to. */
export function dayAndTime(at: Instant, zone: Zone, language: MessageLanguage): string {
	const { date, time, weekday } = localParts(at, zone);
	const dayName = WEEKDAY_WORDS[language][WEEKDAYS.indexOf(weekday)];
	const month = MONTH_WORDS[language][Number(date.slice(5, 7)) - 1];
	return `${dayName} ${Number(date.slice(8))} ${month} ${time}`;
}

/**
 * A name as a patient's message may carry it: on one line, in the cheap alphabet, and the fallback in its place
 * when it holds a denied word or letters that the alphabet lacks.
 */
export function safeName(name: string, fallback: string): string {
	const line = toGsm7(name).replace(/\s+/g, ' ').trim();
	return line !== '' && isGsm7(line) && deniedWords(line).length === 0 ? line : fallback;
}

/** The text cut to so many units of a message, with a full stop where it was cut. */
export function shortened(text: string, units: number): string {
	if (measureSms(text).units <= units) {
		return text;
	}
	let characters = [...text];
	while (measureSms(characters.join('')).units > units - 1) {
		characters = characters.slice(0, -1);
	}
	return `${characters.join('').trimEnd()}.`;
}

/** How much of sender and place is kept, from all of it to what always fits. */
const ROOMS = [Infinity, 36, 24, 12];

/** The fullest text that fits one part: names are shortened, nothing is left out. */
export function fitted(
	write: (sender: string, place: string) => string,
	sender: string,
	place: string
): string {
	const texts = ROOMS.map((room) => write(shortened(sender, room), shortened(place, room)));
	return texts.find(isOneSegment) ?? texts.at(-1) ?? '';
}
