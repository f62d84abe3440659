/**
 * Mails: a subject that tells nothing, and a link that opens only after signing in. Subjects and first lines show
 * on locked screens and in previews, so they are the same for every patient.
 */
import { placeWords, type BedsideFields } from './escalation';
import { number, placeName, senderName, type SenderFields, type VisitFields } from './frame';
import { dayAndTime, GRADE_WORDS, PRODUCT } from './wording';
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

/** To somebody who is needed, where neither text nor notice got through to them. */
export const callMail: StaffWording<BedsideFields, MailText> = {
	en: (fields) => ({
		subject: `${PRODUCT} ${GRADE_WORDS[fields.grade]}`,
		text: letter(`${placeWords(fields)}. Somebody is needed. To take it open:`, fields.link)
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

/** To a patient: the visit stays at its time and place, and takes longer or shorter. */
export const visitLengthMail: Wording<VisitFields & { readonly minutes: number }, MailText> = {
	en: (fields) => {
		const news = `Your visit ${whenAndWhere(fields, 'en')}, now takes ${fields.minutes} minutes.`;
		return visitLetter(fields, 'en', 'your visit', news);
	},
	es: (fields) => {
		const news = `Su cita ${whenAndWhere(fields, 'es')}, dura ahora ${fields.minutes} minutos.`;
		return visitLetter(fields, 'es', 'su cita', news);
	}
};

/** To a patient: the visit is cancelled. */
export const visitCancelledMail: Wording<VisitFields, MailText> = {
	en: (fields) => {
		const news = `Your visit ${whenAndWhere(fields, 'en')} is cancelled.`;
		return visitLetter(fields, 'en', 'your visit is cancelled', news, 'takes it out of');
	},
	es: (fields) => {
		const news = `Su cita ${whenAndWhere(fields, 'es')} se ha anulado.`;
		return visitLetter(fields, 'es', 'su cita se ha anulado', news, 'takes it out of');
	}
};

/** To a patient: all visits ahead are cancelled at once. Each is named, because not every calendar reads the file. */
export const visitsCancelledMail: Wording<
	SenderFields & { readonly visits: readonly Omit<VisitFields, keyof SenderFields>[] },
	MailText
> = {
	en: (fields) => {
		const news = `Your visits are cancelled:\n\n${listed(fields, 'en')}`;
		return visitLetter(fields, 'en', 'your visits are cancelled', news, 'takes them out of');
	},
	es: (fields) => {
		const news = `Sus citas se han anulado:\n\n${listed(fields, 'es')}`;
		return visitLetter(fields, 'es', 'sus citas se han anulado', news, 'takes them out of');
	}
};

function listed(
	{ visits, ...sender }: SenderFields & { readonly visits: readonly Omit<VisitFields, keyof SenderFields>[] },
	language: MessageLanguage
): string {
	return visits.map((visit) => whenAndWhere({ ...sender, ...visit }, language)).join('\n');
}

function whenAndWhere(fields: VisitFields, language: MessageLanguage): string {
	return `${dayAndTime(fields.startsAt, fields.zone, language)}, ${placeName(fields, language)}`;
}

/** What the file with the mail does to a calendar. */
type FileDoes = 'puts it into' | 'takes it out of' | 'takes them out of';
const FILE_DOES: Record<MessageLanguage, Record<FileDoes, string>> = {
	en: {
		'puts it into': 'The file with this mail puts it into your calendar.',
		'takes it out of': 'The file with this mail takes it out of your calendar.',
		'takes them out of': 'The file with this mail takes them out of your calendar.'
	},
	es: {
		'puts it into': 'El archivo de este correo lo pone en su calendario.',
		'takes it out of': 'El archivo de este correo la quita de su calendario.',
		'takes them out of': 'El archivo de este correo las quita de su calendario.'
	}
};
const LAST_LINES: Record<MessageLanguage, (phone: string) => string> = {
	en: (phone) => `Questions: ${phone}\n\n-- \nNobody reads answers to this address.\n`,
	es: (phone) => `Preguntas: ${phone}\n\n-- \nNadie lee las respuestas a esta dirección.\n`
};

function visitLetter(
	fields: SenderFields,
	language: MessageLanguage,
	about: string,
	news: string,
	fileDoes: FileDoes = 'puts it into'
): MailText {
	return {
		subject: `${senderName(fields, language)}: ${about}`,
		text: `${news}\n\n${FILE_DOES[language][fileDoes]}\n\n${LAST_LINES[language](number(fields))}`
	};
}

function letter(sentence: string, link: string): string {
	return `${sentence}\n\n${link}\n\n-- \n${FOOTER}\n`;
}
