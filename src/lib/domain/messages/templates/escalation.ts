/** Texts to staff about an escalation: product, unit, bed, grade, link, code. No name, no reason, no reading. */
import type { Grade, Role } from '../../core/codes';
import { localParts } from '../../core/time';
import type { Instant, Zone } from '../../core/time';
import { toGsm7 } from '../gsm7';
import { GRADE_WORDS, PRODUCT, fitted } from './wording';
import type { StaffWording } from './wording';

/** Which bed it is about, and how urgent. */
export interface PlaceFields {
	readonly unit: string;
	/** Null for a patient without a bed, in the outpatient programme. */
	readonly bed: string | null;
	readonly grade: Grade;
}

export interface BedsideFields extends PlaceFields {
	/** The whole address of the page. */
	readonly link: string;
}

export interface EscalationFields extends BedsideFields {
	/** What to answer with to take it without opening anything; null when there is none. */
	readonly code: string | null;
}

export interface EarlierFields extends PlaceFields {
	/** When it was taken, or when it ended. */
	readonly since: Instant;
	/** The unit's: the time is that of the clock on its wall. */
	readonly zone: Zone;
}

export interface TakenFields extends PlaceFields {
	/** What whoever has it is; nobody is named. */
	readonly holder: Role;
}

export interface HeldFields extends EarlierFields, TakenFields {}

/** Somebody is needed. */
export const escalation: StaffWording<EscalationFields> = {
	en: (fields) => {
		const how = fields.code === null ? '' : ` or reply TAKE ${fields.code}`;
		return withPlace(fields, (place) => `${place}. To take it open ${fields.link}${how}`);
	}
};

/** To those who were told: somebody has it, by role. There is nothing to open. */
export const escalationTaken: StaffWording<TakenFields> = {
	en: (fields) =>
		withPlace(fields, (place) => {
			return `${place}: ${HOLDER_WORDS[fields.holder].toLowerCase()} has it. You need do nothing.`;
		})
};

/** To the holder who is not at the bedside in time. */
export const holderAsked: StaffWording<BedsideFields> = {
	en: (fields) =>
		withPlace(fields, (place) => {
			return `${place}: are you there? Else others are told. ${fields.link}`;
		})
};

/** Answer to TAKE: it is yours. */
export const tookIt: StaffWording<BedsideFields> = {
	en: (fields) => withPlace(fields, (place) => `${place}: it is yours. ${fields.link}`)
};

/** Answer to TAKE: somebody was first. */
export const takenBefore: StaffWording<HeldFields> = {
	en: (fields) =>
		withPlace(fields, (place) => {
			const who = HOLDER_WORDS[fields.holder];
			return `${place}: NOT yours. ${who} has it since ${clock(fields)}. Nothing is asked of you now.`;
		})
};

/** Answer to TAKE: settled or withdrawn. */
export const overBefore: StaffWording<EarlierFields> = {
	en: (fields) =>
		withPlace(fields, (place) => {
			return `${place}: NOT taken, it is over since ${clock(fields)}. Nothing is asked of you now.`;
		})
};

/** Answer to TAKE by a person whose role takes no calls. */
export const mayNotTake: StaffWording<Record<never, never>> = {
	en: () => `${PRODUCT}: NOT taken. Your account may not take calls. The call goes on to others.`
};

/** Answer to TAKE with a code that no call of theirs has. What they may not see is answered like what is not there. */
export const unknownCode: StaffWording<{ readonly code: string }> = {
	en: ({ code }) =>
		`${PRODUCT}: NOT taken. No call that you may take has the code ${code}. Look at the code again, or open the link of the call.`
};

/** Answer to TAKE alone, when several calls wait. */
export const whichOne: StaffWording<Record<never, never>> = {
	en: () =>
		`${PRODUCT}: NOT taken. Several calls were sent to you. Reply TAKE and the code of one, or open its link.`
};

/** Answer to TAKE alone, when none waits. */
export const noneOpen: StaffWording<Record<never, never>> = {
	en: () => `${PRODUCT}: NOT taken. No call that was sent to you is waiting. Sign in to see all of them.`
};

/** Answer to any other text of staff. Nothing has been taken and nobody reads it, and the text must say so. */
export const staffUnclear: StaffWording<{ readonly code: string | null }> = {
	en: ({ code }) =>
		`${PRODUCT}: NOT taken, and nobody reads this. To take a call reply TAKE ${code ?? 'and its code'}, or open its link.`
};

/** Answer to a number that is on record for several people: whose reply it was cannot be told. */
export const sharedNumber: StaffWording<Record<never, never>> = {
	en: () =>
		`${PRODUCT}: NOT taken. This number is on record for several people. Open the link of the call, or sign in.`
};

/** Answer to TAKE from a number that nobody of staff has. */
export const unknownNumber: StaffWording<Record<never, never>> = {
	en: () => `${PRODUCT}: NOT taken. This number is on record for nobody who takes calls. Sign in to take it.`
};

/** 'Surgeon' would tell what kind of ward it is. */
export const HOLDER_WORDS: Record<Role, string> = {
	surgeon: 'A doctor',
	physician: 'A doctor',
	nurse: 'A nurse',
	therapist: 'A colleague',
	'speech-therapist': 'A colleague',
	coordinator: 'A colleague',
	admin: 'A colleague'
};

/** Where to go, in letters that need not fit a text. */
export function placeWords({ unit, bed }: PlaceFields): string {
	return bed === null ? unit : `${unit}, bed ${bed}`;
}

function clock({ since, zone }: EarlierFields): string {
	return localParts(since, zone).time;
}

/** Product, grade, unit and bed, then the rest; a long unit name is cut so that it stays one part. */
function withPlace({ unit, bed, grade }: PlaceFields, write: (place: string) => string): string {
	const where = bed === null ? '' : `, bed ${toGsm7(bed)}`;
	return fitted((_, name) => write(`${PRODUCT} ${GRADE_WORDS[grade]}: ${name}${where}`), '', toGsm7(unit));
}
