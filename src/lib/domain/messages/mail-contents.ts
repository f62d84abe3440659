/**
 * What each mail may tell, beside words that are the same for everybody: a mail lies in a mailbox for years. A test
 * holds each template to its list.
 */
import type { MailTemplate } from './templates';

export const MAIL_FACTS = [
	'sender',
	'phone',
	'time',
	'place',
	'minutes',
	'count',
	'link',
	'unit',
	'bed',
	'grade'
] as const;
export type MailFact = (typeof MAIL_FACTS)[number];

const VISIT = ['sender', 'phone', 'time', 'place'] as const;

export const MAIL_TELLS: Record<MailTemplate, readonly MailFact[]> = {
	referrer: ['link'],
	summary: ['link'],
	invitation: ['link'],
	call: ['unit', 'bed', 'grade', 'link'],
	'visit-booked': VISIT,
	'series-booked': ['sender', 'phone', 'count'],
	'visit-moved': VISIT,
	'visit-length': [...VISIT, 'minutes'],
	'visit-cancelled': VISIT,
	'visits-cancelled': VISIT,
	'page-link': ['sender', 'phone', 'link']
};
