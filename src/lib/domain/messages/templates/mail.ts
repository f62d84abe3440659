/**
 * Mails: a subject that tells nothing, and a link that opens only after signing in. Subjects and first lines show
 * on locked screens and in previews, so they are the same for every patient.
 */
import { number, placeName, senderName, type SenderFields, type VisitFields } from './frame';
import { dayAndTime, PRODUCT } from './wording';
import type { MessageLanguage, StaffWording, Wording } from './wording';

export interface MailText {
	readonly subject: string;
	/** Plain text, lines of at most 78 characters but for the link. */
	readonly text: string;
}

export interface LinkFields {
	/** The whole address of the page. */
	readonly link: string;
}

const FOOTER = `${PRODUCT} sends links only. Nobody reads answers to this address.`;

/** To the referrer: there is something to read. */
export const referrerMail: StaffWording<LinkFields, MailText> = {
	en: ({ link }) => ({
		subject: `${PRODUCT}: something to read`,
		text: letter('There is news about a referral of yours. Sign in to read it:', link)
	})
};

/** To the referrer: what they asked for is over, or the patient has left; how it went stands behind the sign-in. */
export const summaryMail: StaffWording<LinkFields, MailText> = {
	en: ({ link }) => ({
		subject: `${PRODUCT}: a summary to read`,
		text: letter('A referral of yours has come to its end. Sign in to read how it went:', link)
	})
};

/** To somebody who gets an account, or who has forgotten the password of one. */
export const invitationMail: StaffWording<LinkFields, MailText> = {
	en: ({ link }) => ({
		subject: `${PRODUCT}: your account`,
		text: letter('Choose a password for your account here; the link works once:', link)
	})
};

/** To a patient: one visit is booked. The calendar file goes with it. */
export const visitBookedMail: Wording<VisitFields, MailText> = {
	en: (fields) => visitLetter(fields, 'en', 'your visit', `Your visit is ${whenAndWhere(fields, 'en')}.`),
	es: (fields) => visitLetter(fields, 'es', 'su cita', `Su cita es ${whenAndWhere(fields, 'es')}.`)
};

/** To a patient: a series is booked. Its days are in the calendar file, where a later change finds them. */
export const seriesBookedMail: Wording<SenderFields & { readonly count: number }, MailText> = {
	en: (fields) =>
		visitLetter(
			fields,
			'en',
			'your visits',
			`${fields.count} visits are booked for you. Their days and times are in the file.`
		),
	es: (fields) =>
		visitLetter(
			fields,
			'es',
			'sus citas',
			`Tiene ${fields.count} citas. Los días y las horas están en el archivo.`
		)
};

/** To a patient: the visit has another time or place now. */
export const visitMovedMail: Wording<VisitFields, MailText> = {
	en: (fields) =>
		visitLetter(fields, 'en', 'your visit has moved', `Your visit is now ${whenAndWhere(fields, 'en')}.`),
	es: (fields) =>
		visitLetter(fields, 'es', 'su cita cambia', `Su cita es ahora ${whenAndWhere(fields, 'es')}.`)
};

/** To a patient: the visit is cancelled. */
export const visitCancelledMail: Wording<VisitFields, MailText> = {
	en: (fields) =>
		visitLetter(
			fields,
			'en',
			'your visit is cancelled',
			`Your visit ${whenAndWhere(fields, 'en')} is cancelled.`
		),
	es: (fields) =>
		visitLetter(fields, 'es', 'su cita se ha anulado', `Su cita ${whenAndWhere(fields, 'es')} se ha anulado.`)
};

function whenAndWhere(fields: VisitFields, language: MessageLanguage): string {
	return `${dayAndTime(fields.startsAt, fields.zone, language)}, ${placeName(fields, language)}`;
}

const LAST_LINES: Record<MessageLanguage, (phone: string) => string> = {
	en: (phone) =>
		`The file with this mail puts it into your calendar.\n\nQuestions: ${phone}\n\n-- \nNobody reads answers to this address.\n`,
	es: (phone) =>
		`El archivo de este correo lo pone en su calendario.\n\nPreguntas: ${phone}\n\n-- \nNadie lee las respuestas a esta dirección.\n`
};

function visitLetter(fields: SenderFields, language: MessageLanguage, about: string, news: string): MailText {
	return {
		subject: `${senderName(fields, language)}: ${about}`,
		text: `${news}\n\n${LAST_LINES[language](number(fields))}`
	};
}

function letter(sentence: string, link: string): string {
	return `${sentence}\n\n${link}\n\n-- \n${FOOTER}\n`;
}
