import { z } from 'zod';
import { CLOSE_REASONS, isOneOf, RHYTHMS, SEXES } from '../core/codes';
import { text, tooLong } from '../core/fields';
import { written } from './identifiers';
import { contactBody, operation } from './operation';

const level = z
	.number('The level is a number from 1 to 6.')
	.int('The level is a whole number from 1 to 6.')
	.min(1, 'The level is at least 1.')
	.max(6, 'The level is at most 6.');

const unit = z.string('The unit is missing or no text.').min(1, 'The unit is empty.').max(64);

/** Messages carry the bed, and have little room. */
export const BED_MAX = 20;

/** A bed as people write it; a gym needs none. */
const bed = text('The bed', BED_MAX).refine((typed) => written(typed) !== '', 'The bed is empty.');

const mrn = text('The hospital number', 40).refine(
	(typed) => written(typed) !== '',
	'The hospital number is empty.'
);

const patient = z.strictObject({
	name: text("The patient's name", 120),
	birthDate: z.iso.date('The birth date is a date like 1958-09-05.'),
	sex: z.enum(SEXES, `The sex is one of ${SEXES.join(', ')}.`),
	mrn,
	phone: contactBody.shape.phone.unwrap().unwrap().optional(),
	language: contactBody.shape.language,
	smsConsent: contactBody.shape.smsConsent,
	email: contactBody.shape.email.unwrap().unwrap().optional(),
	mailConsent: contactBody.shape.mailConsent,
	/** The hospital's where it is left out. */
	zone: contactBody.shape.zone
});

export const admitBody = z.strictObject({
	patient,
	operation: operation.optional(),
	surgeonId: z.string().min(1, 'The surgeon is empty.').max(120, tooLong('The surgeon', 120)).optional(),
	unit,
	/** Needed in a unit with beds; a gym has none. */
	bed: bed.nullish(),
	level: level.optional(),
	betaBlocked: z.boolean('The rate-slowing drug is true, false or null.').nullable().optional(),
	rhythm: z.enum(RHYTHMS, `The rhythm is one of ${RHYTHMS.join(', ')}.`).optional(),
	/** Set once a person has read that the record has another name, and says that this is the name now. */
	confirmName: z.boolean('The confirmation of the name is true or false.').optional()
});
export type AdmitInput = z.infer<typeof admitBody>;

/** Where a patient goes: a bed of a unit, or a gym without one. */
export const moveBody = z.strictObject({ unit, bed: bed.nullish() });
export type MoveInput = z.infer<typeof moveBody>;

/** The move as a page asks for it; whether the unit has beds knows the server. */
export const moveForm = z.object({
	unit: z.string().min(1, 'Unit: choose one.').max(64, tooLong('Unit', 64)).default(''),
	bed: z.string().trim().max(BED_MAX, tooLong('The bed', BED_MAX)).default(''),
	/** Asked where a call for help is open: whoever comes must not go to the old bed. */
	toldHolder: z.boolean().default(false)
});

/** Why a stay is over. */
export const closeBody = z.strictObject({
	reason: z.enum(CLOSE_REASONS, `The reason is one of ${CLOSE_REASONS.join(', ')}.`)
});

/** The closing as a page asks for it: nothing is chosen beforehand. */
export const closeForm = z.object({
	reason: z
		.string()
		.default('')
		.refine((value) => isOneOf(CLOSE_REASONS, value), 'The reason is empty: choose why the episode is over.')
});
