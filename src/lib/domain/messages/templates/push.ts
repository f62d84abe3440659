/**
 * What a notice on a device says: the same as the text beside it, product, grade, unit and bed. It opens a page when it
 * is tapped; nothing can be taken from the notice itself. Its title stands on locked screens and names no unit.
 */
import { HOLDER_WORDS, placeWords, type PlaceFields, type TakenFields } from './escalation';
import type { MailText } from './mail';
import { GRADE_WORDS, PRODUCT, type StaffWording } from './wording';

/** Somebody is needed. */
export const call: StaffWording<PlaceFields, MailText> = {
	en: (fields) => notice(fields, 'Somebody is needed. Tap to open it.')
};

/** To the holder who is not at the bedside in time. */
export const holderAsked: StaffWording<PlaceFields, MailText> = {
	en: (fields) => notice(fields, 'Are you there? Else others are told. Tap to open it.')
};

/** To those who were told: somebody has it, by role. */
export const callTaken: StaffWording<TakenFields, MailText> = {
	en: (fields) => notice(fields, `${HOLDER_WORDS[fields.holder]} has it. You need do nothing.`)
};

/** Asked for on one's own page, to see whether a device shows notices. */
export const trial: StaffWording<Record<never, never>, MailText> = {
	en: () => ({ subject: PRODUCT, text: 'Notices reach this device. Calls for help look like this one.' })
};

function notice(fields: PlaceFields, words: string): MailText {
	return { subject: `${PRODUCT} ${GRADE_WORDS[fields.grade]}`, text: `${placeWords(fields)}. ${words}` };
}
