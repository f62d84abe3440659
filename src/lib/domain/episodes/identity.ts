/**
 * Is the patient who is admitted the one on record under that hospital number? Nothing is picked silently: what
 * tells two people apart must agree, and what may change with time is brought up to date.
 */
import type { Sex } from '../core/codes';
import type { FieldError } from '../core/errors';
import { isSameName, normaliseName } from './identifiers';

/** The parts of a patient's record that an admission can amend. */
export const PATIENT_FIELDS = [
	'name',
	'sex',
	'phone',
	'language',
	'smsConsent',
	'email',
	'mailConsent',
	'zone'
] as const;
export type PatientField = (typeof PATIENT_FIELDS)[number];

/** How the message about another name begins; a page asks then whether it is the name now. */
export const NAME_DIFFERS = "The patient's name differs";

/** A patient as far as an admission states them. */
export interface Identity {
	name: string;
	birthDate: string;
	sex: Sex;
}

/** Where an admission and the record contradict each other. */
export interface Conflicts {
	/** One for each field, and for another name one of the number before it, with a pointer into the body of the JSON API. Empty when it is the same person. */
	errors: FieldError[];
	/** True when a person may confirm it: a name can change, a birth date cannot. */
	confirmable: boolean;
}

/**
 * What contradicts the record. A sex that is not known on one side contradicts nothing.
 * @param mrn the hospital number, for the message
 */
export function conflictsWith(mrn: string, known: Identity, given: Identity): Conflicts {
	const errors: FieldError[] = [];
	const otherName = !isSameName(known.name, given.name);
	if (otherName) {
		// A mistyped number is more likely than a new name, so it is asked about first.
		errors.push(
			{
				pointer: '/patient/mrn',
				message: `Hospital number ${mrn} belongs to ${known.name}, born ${known.birthDate}. Is it the right number?`
			},
			{
				pointer: '/patient/name',
				message: `${NAME_DIFFERS}: on record is ${known.name}, not ${normaliseName(given.name)}.`
			}
		);
	}
	const confirmable = otherName && known.birthDate === given.birthDate && !isOtherSex(known.sex, given.sex);
	if (known.birthDate !== given.birthDate) {
		errors.push({
			pointer: '/patient/birthDate',
			message: `The birth date differs: hospital number ${mrn} is on record with ${known.birthDate}, not ${given.birthDate}.`
		});
	}
	if (isOtherSex(known.sex, given.sex)) {
		errors.push({
			pointer: '/patient/sex',
			message: `The sex differs: hospital number ${mrn} is on record as ${known.sex}, not ${given.sex}.`
		});
	}
	return { errors, confirmable };
}

function isOtherSex(known: Sex, given: Sex): boolean {
	return known !== given && known !== 'unknown' && given !== 'unknown';
}
