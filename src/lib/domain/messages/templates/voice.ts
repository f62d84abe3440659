/**
 * What a telephone says when text messages did not reach somebody who is needed: product, grade, unit, bed. A call may
 * end on an answering machine or a loudspeaker, so there is no name, no reason and no reading in it either.
 */
import type { Grade } from '../../core/codes';
import { localParts } from '../../core/time';
import {
	HOLDER_WORDS,
	placeWords,
	type EarlierFields,
	type HeldFields,
	type PlaceFields
} from './escalation';
import { PRODUCT, type StaffWording } from './wording';

const SPOKEN_GRADES: Record<Grade, string> = { high: 'High', medium: 'Medium', low: 'Low' };

/** Somebody is needed. */
export const call: StaffWording<PlaceFields> = {
	en: (fields) =>
		`This is ${PRODUCT}. ${SPOKEN_GRADES[fields.grade]} call for help. ${placeWords(fields)}. To take it, press 1.`
};

/** After the digit: it is yours. */
export const yours: StaffWording<PlaceFields> = {
	en: (fields) => `It is yours. ${placeWords(fields)}. Please go now.`
};

/** After the digit: somebody was first. */
export const takenBefore: StaffWording<HeldFields> = {
	en: (fields) =>
		`Not yours. ${HOLDER_WORDS[fields.holder]} has it since ${clock(fields)}. Nothing is asked of you now.`
};

/** After the digit: settled or withdrawn. */
export const overBefore: StaffWording<EarlierFields> = {
	en: (fields) => `Not taken. It is over since ${clock(fields)}. Nothing is asked of you now.`
};

/** After the digit of somebody whose account may not take it, or when the call cannot be found. */
export const notTaken: StaffWording<Record<never, never>> = {
	en: () => 'Not taken. The call goes on to others.'
};

function clock({ since, zone }: EarlierFields): string {
	return localParts(since, zone).time;
}
