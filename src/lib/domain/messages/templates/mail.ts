/**
 * Mails: a subject that tells nothing, and a link that opens only after signing in. Subjects and first lines show
 * on locked screens and in previews, so they are the same for every patient.
 */
import { PRODUCT } from './wording';
import type { Wording } from './wording';

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
export const referrerMail: Wording<LinkFields, MailText> = {
	en: ({ link }) => ({
		subject: `${PRODUCT}: something to read`,
		text: letter('There is news about a referral of yours. Sign in to read it:', link)
	})
};

/** To somebody who gets an account, or who has forgotten the password of one. */
export const invitationMail: Wording<LinkFields, MailText> = {
	en: ({ link }) => ({
		subject: `${PRODUCT}: your account`,
		text: letter('Choose a password for your account here; the link works once:', link)
	})
};

function letter(sentence: string, link: string): string {
	return `${sentence}\n\n${link}\n\n-- \n${FOOTER}\n`;
}
