/** The private link to a patient's own page, by text or by mail. What the page shows is not said. */
import { number, senderName, withSender, type SenderFields } from './frame';
import type { MailText } from './mail';
import type { Wording } from './wording';

export interface PageLinkFields extends SenderFields {
	/** The whole address of the page. */
	readonly link: string;
}

export const pageLink: Wording<PageLinkFields> = {
	en: (fields) =>
		withSender(fields, 'en', (sender) => {
			return `${sender}: your visits: ${fields.link} For you alone. Help: ${number(fields)}. STOP ends texts.`;
		}),
	es: (fields) =>
		withSender(fields, 'es', (sender) => {
			return `${sender}: sus citas ${fields.link} Solo para usted. Tel. ${number(fields)}. STOP: no mas.`;
		})
};

export const pageLinkMail: Wording<PageLinkFields, MailText> = {
	en: (fields) => ({
		subject: `${senderName(fields, 'en')}: your visits`,
		text: [
			'Here you see your visits, say that you will come, or that you cannot:',
			fields.link,
			`The link is for you alone. Questions: ${number(fields)}.`,
			'-- \nNobody reads answers to this address.\n'
		].join('\n\n')
	}),
	es: (fields) => ({
		subject: `${senderName(fields, 'es')}: sus citas`,
		text: [
			'Aquí puede ver sus citas, confirmar que viene o decir que no puede:',
			fields.link,
			`El enlace es solo para usted. Preguntas: ${number(fields)}.`,
			'-- \nNadie lee las respuestas a esta dirección.\n'
		].join('\n\n')
	})
};
