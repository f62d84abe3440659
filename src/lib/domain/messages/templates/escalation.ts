/** Texts to staff about an escalation: product, unit, bed, grade, link, code. No name, no reason, no reading. */
import type { Grade } from '../../core/codes';
import { toGsm7 } from '../gsm7';
import { GRADE_WORDS, PRODUCT } from './wording';
import type { MessageLanguage, Wording } from './wording';

/** Which bed it is about, and how urgent. */
export interface BedsideFields {
	readonly unit: string;
	/** Null for a patient without a bed, in the outpatient programme. */
	readonly bed: string | null;
	readonly grade: Grade;
	/** The whole address of the page. */
	readonly link: string;
}

export interface EscalationFields extends BedsideFields {
	/** What to answer with to take it without opening anything; null when there is none. */
	readonly code: string | null;
}

/** Somebody is needed. */
export const escalation: Wording<EscalationFields> = {
	en: (fields) => {
		const how = fields.code === null ? '' : ` or reply TAKE ${fields.code}`;
		return `${PRODUCT} ${whereAndGrade(fields, 'en')}. To take it open ${fields.link}${how}`;
	}
};

/** To those who were told: somebody has it. */
export const escalationTaken: Wording<BedsideFields> = {
	en: (fields) =>
		`${PRODUCT} ${whereAndGrade(fields, 'en')}: somebody has taken it. Nothing is asked of you now. ${fields.link}`
};

/** Answer to TAKE: it is yours. */
export const tookIt: Wording<BedsideFields> = {
	en: (fields) => `${PRODUCT} ${whereAndGrade(fields, 'en')}: it is yours. ${fields.link}`
};

/** Answer to PASS: not yours, the chain goes on. */
export const passedIt: Wording<BedsideFields> = {
	en: (fields) => `${PRODUCT} ${whereAndGrade(fields, 'en')}: the next person is told now. ${fields.link}`
};

/** Answer to a text of staff that cannot be carried out. Nothing has been taken, and the text must say so. */
export const staffUnclear: Wording<Record<never, never>> = {
	en: () =>
		`${PRODUCT}: NOT taken. No open call fits your text. Open the link of the call, or reply TAKE and its code.`
};

function whereAndGrade({ unit, bed, grade }: BedsideFields, language: MessageLanguage): string {
	const place = [toGsm7(unit), ...(bed === null ? [] : [bedWords[language](toGsm7(bed))])].join(', ');
	return `${GRADE_WORDS[language][grade]}: ${place}`;
}

const bedWords: Record<MessageLanguage, (bed: string) => string> = { en: (bed) => `bed ${bed}` };
