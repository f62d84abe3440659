/** Every template filled with an invented visit and an invented call: what people get, word for word. */
import { deniedWords } from './deny-list';
import { MAIL_TELLS, type MailFact } from './mail-contents';
import { measureSms, type SmsLength } from './sms-length';
import {
	PATIENT_MAILS,
	PATIENT_SMS,
	STAFF_CALLS,
	STAFF_MAILS,
	STAFF_NOTICES,
	STAFF_SMS,
	type MailTemplate
} from './templates';
import type { MailText } from './templates/mail';
import type { MessageChannel } from './codes';
import type { MessageLanguage } from './templates/wording';

export interface TemplatePreview {
	readonly name: string;
	readonly channel: MessageChannel;
	readonly to: 'staff' | 'patient';
	readonly language: MessageLanguage;
	readonly subject: string | null;
	readonly text: string;
	/** Of a text message alone. */
	readonly length: SmsLength | null;
	/** Of a mail alone: what it may tell beside words that are the same for everybody. */
	readonly tells: readonly MailFact[] | null;
	/** Words that may not leave, should any be in it after all. */
	readonly denied: readonly string[];
}

/** What the hospital itself puts into its messages. */
export interface PreviewSender {
	readonly sender: string;
	readonly phone: string;
	readonly emergency: string;
	readonly zone: string;
	/** The whole address of the product. */
	readonly address: string;
}

type Write<T> = (fields: object) => T;
type Wordings<T> = Record<string, Partial<Record<MessageLanguage, Write<T>>>>;
type About = Pick<TemplatePreview, 'channel' | 'to'>;

/** @param startsAt an instant that the invented visit has, and the invented call */
export function previewsOf(hospital: PreviewSender, startsAt: number): TemplatePreview[] {
	const fields = invented(hospital, startsAt);
	return [
		...textsOf(PATIENT_SMS, { channel: 'sms', to: 'patient' }, fields),
		...mailsOf(PATIENT_MAILS, { channel: 'mail', to: 'patient' }, fields),
		...textsOf(STAFF_SMS, { channel: 'sms', to: 'staff' }, fields),
		...textsOf(STAFF_CALLS, { channel: 'voice', to: 'staff' }, fields),
		...noticesOf(STAFF_NOTICES, { channel: 'push', to: 'staff' }, fields),
		...mailsOf(STAFF_MAILS, { channel: 'mail', to: 'staff' }, fields)
	];
}

function invented({ address, ...hospital }: PreviewSender, startsAt: number): object {
	const place = 'East Gym';
	const visit = { startsAt, zone: hospital.zone, place };
	return {
		...hospital,
		...visit,
		visits: [visit],
		minutes: 45,
		count: 12,
		confirmed: false,
		unit: 'Tern Ward',
		bed: '4',
		grade: 'high',
		code: '4821',
		holder: 'nurse',
		since: startsAt,
		link: `${address}/t/q7Zr2LxV0aYd8KcM3nTfPw`
	};
}

function textsOf(wordings: object, about: About, fields: object): TemplatePreview[] {
	return each(wordings as Wordings<string>, (write) => {
		const text = write(fields);
		const length = about.channel === 'sms' ? measureSms(text) : null;
		return { ...about, subject: null, text, length, tells: null, denied: deniedWords(text) };
	});
}

function noticesOf(wordings: object, about: About, fields: object): TemplatePreview[] {
	return each(wordings as Wordings<MailText>, (write) => {
		const { subject, text } = write(fields);
		return { ...about, subject, text, length: null, tells: null, denied: deniedWords(`${subject} ${text}`) };
	});
}

function mailsOf(wordings: object, about: About, fields: object): TemplatePreview[] {
	return each(wordings as Wordings<MailText>, (write, name) => {
		const { subject, text } = write(fields);
		const tells = MAIL_TELLS[name as MailTemplate];
		return { ...about, subject, text, length: null, tells, denied: deniedWords(`${subject} ${text}`) };
	});
}

function each<T>(
	wordings: Wordings<T>,
	preview: (write: Write<T>, name: string) => Omit<TemplatePreview, 'name' | 'language'>
): TemplatePreview[] {
	return Object.entries(wordings).flatMap(([name, byLanguage]) =>
		Object.entries(byLanguage).map(([language, write]) => ({
			name,
			language: language as MessageLanguage,
			...preview(write, name)
		}))
	);
}
