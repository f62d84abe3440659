/** What all words to patients share: who sends, whom to call, and names that are safe to send. */
import { fitted, safeName } from './wording';
import type { MessageLanguage } from './wording';
import type { Instant, Zone } from '../../core/time';

export interface SenderFields {
	/** The hospital's name. */
	readonly sender: string;
	/** The number to call, as it should be read. */
	readonly phone: string;
}

export interface VisitFields extends SenderFields {
	readonly startsAt: Instant;
	/** The hospital's zone: the time is that of the clock on its wall. */
	readonly zone: Zone;
	readonly place: string;
}

export interface HelpFields extends SenderFields {
	/** The public emergency number, such as 112. */
	readonly emergency: string;
}

const FALLBACK: Record<MessageLanguage, { sender: string; place: string }> = {
	en: { sender: 'Your hospital', place: 'the usual place' },
	es: { sender: 'Su hospital', place: 'el lugar habitual' }
};

/** The sender's name as a patient's message may carry it. */
export function senderName({ sender }: Pick<SenderFields, 'sender'>, language: MessageLanguage): string {
	return safeName(sender, FALLBACK[language].sender);
}

/** The place's name as a patient's message may carry it. */
export function placeName({ place }: Pick<VisitFields, 'place'>, language: MessageLanguage): string {
	return safeName(place, FALLBACK[language].place);
}

/** A text of one part with sender and place, which are cut where there is no room. */
export function withNames(
	fields: Pick<VisitFields, 'sender' | 'place'>,
	language: MessageLanguage,
	write: (sender: string, place: string) => string
): string {
	return fitted(write, senderName(fields, language), placeName(fields, language));
}

/** A text of one part with the sender, whose name is cut where there is no room. */
export function withSender(
	fields: Pick<SenderFields, 'sender'>,
	language: MessageLanguage,
	write: (sender: string) => string
): string {
	return fitted(write, senderName(fields, language), '');
}

/** A number may be written wide on paper; in a text it must fit. */
export function number({ phone }: Pick<SenderFields, 'phone'>): string {
	return phone.length > 17 ? phone.replace(/[^\d+]/g, '') : phone;
}
