/**
 * Every text that leaves the product, by name. A template takes typed fields and gives text; it has no way to a
 * patient's record, so that it cannot tell what it does not know.
 */
import * as escalations from './templates/escalation';
import * as mails from './templates/mail';
import * as pages from './templates/page';
import * as notices from './templates/push';
import * as replies from './templates/reply';
import * as visits from './templates/visit';
import * as voice from './templates/voice';
import { messageLanguage } from './templates/wording';
import type { MailText } from './templates/mail';
import type { MessageLanguage, StaffWording } from './templates/wording';

/** Texts to staff may name unit and bed; texts to patients may not. */
export const STAFF_SMS = {
	escalation: escalations.escalation,
	'escalation-taken': escalations.escalationTaken,
	'holder-asked': escalations.holderAsked,
	'took-it': escalations.tookIt,
	'taken-before': escalations.takenBefore,
	'over-before': escalations.overBefore,
	'may-not-take': escalations.mayNotTake,
	'unknown-code': escalations.unknownCode,
	'which-one': escalations.whichOne,
	'none-open': escalations.noneOpen,
	'staff-unclear': escalations.staffUnclear,
	'shared-number': escalations.sharedNumber,
	'unknown-number': escalations.unknownNumber
};

export const PATIENT_SMS = {
	'visit-reminder': visits.visitReminder,
	'visit-moved': visits.visitMoved,
	'visit-cancelled': visits.visitCancelled,
	'visits-cancelled': visits.visitsCancelled,
	'visit-confirmed': replies.visitConfirmed,
	'visit-declined': replies.visitDeclined,
	'no-visit-open': replies.noVisitOpen,
	'person-reads': replies.personReads,
	'texts-stopped': replies.textsStopped,
	'texts-started': replies.textsStarted,
	'texts-help': replies.textsHelp,
	'page-link': pages.pageLink
};

/** What a telephone says. */
export const STAFF_CALLS = {
	call: voice.call,
	yours: voice.yours,
	'taken-before': voice.takenBefore,
	'over-before': voice.overBefore,
	'not-taken': voice.notTaken
};

/** What a notice on a device says. */
export const STAFF_NOTICES = {
	call: notices.call,
	'holder-asked': notices.holderAsked,
	'call-taken': notices.callTaken,
	trial: notices.trial
};

export const STAFF_MAILS = {
	referrer: mails.referrerMail,
	summary: mails.summaryMail,
	invitation: mails.invitationMail,
	call: mails.callMail
};

export const PATIENT_MAILS = {
	'visit-booked': mails.visitBookedMail,
	'series-booked': mails.seriesBookedMail,
	'visit-moved': mails.visitMovedMail,
	'visit-length': mails.visitLengthMail,
	'visit-cancelled': mails.visitCancelledMail,
	'visits-cancelled': mails.visitsCancelledMail,
	'page-link': pages.pageLinkMail
};
export const MAILS = { ...STAFF_MAILS, ...PATIENT_MAILS };

export const SMS = { ...STAFF_SMS, ...PATIENT_SMS };
export type SmsTemplate = keyof typeof SMS;
export type MailTemplate = keyof typeof MAILS;

type AnyWording<Fields, Text> = StaffWording<Fields, Text> &
	Partial<Record<MessageLanguage, (fields: Fields) => Text>>;
type FieldsOf<T> = T extends StaffWording<infer Fields, string | MailText> ? Fields : never;
/** What a template has to be given. */
export type SmsFields<T extends SmsTemplate> = FieldsOf<(typeof SMS)[T]>;
export type MailFields<T extends MailTemplate> = FieldsOf<(typeof MAILS)[T]>;

/** The text of a message, in the receiver's language where it is known, else in English. */
export function smsText<T extends SmsTemplate>(
	template: T,
	fields: SmsFields<T>,
	language: string | null = null
): string {
	const wording = SMS[template] as AnyWording<SmsFields<T>, string>;
	return (wording[messageLanguage(language)] ?? wording.en)(fields);
}

/** Subject and text of a mail, in the receiver's language where it is known, else in English. */
export function mailText<T extends MailTemplate>(
	template: T,
	fields: MailFields<T>,
	language: string | null = null
): MailText {
	const wording = MAILS[template] as AnyWording<MailFields<T>, MailText>;
	return (wording[messageLanguage(language)] ?? wording.en)(fields);
}
