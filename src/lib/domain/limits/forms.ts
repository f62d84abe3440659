/** The bodies and forms by which limits are changed. Each message names field, value and what is allowed. */
import { z } from 'zod';
import { LIMIT_KEYS, SETS } from '../bedside/codes';
import { reason, text } from '../core/fields';

const setName = z.enum(SETS, `set is one of ${SETS.join(', ')}.`);
const key = z.enum(LIMIT_KEYS, 'key is no limit of the response rules.');
const value = z.number('value is a number.');
const agreed = {
	/** The clinical lead who answers for the change. */
	agreedBy: text('agreedBy', 100),
	agreedOn: z.iso.date('agreedOn is a date like 2026-12-14.')
};

/** A unit's limit; a value of null goes back to the default. */
export const changeUnitLimitBody = z.strictObject({ set: setName, key, value: value.nullable(), ...agreed });
export type ChangeUnitLimit = z.output<typeof changeUnitLimitBody>;

/** Which set judges the inpatients of a unit. */
export const chooseUnitSetBody = z.strictObject({
	set: z.enum(['strict', 'guideline'], 'set is strict or guideline.'),
	...agreed
});
export type ChooseUnitSet = z.output<typeof chooseUnitSetBody>;

/** A limit for one patient, with its reason and the last day on which it holds. */
export const setPatientLimitBody = z.strictObject({
	key,
	value,
	reason: reason('reason'),
	untilOn: z.iso.date('untilOn is a date like 2026-12-14.')
});
export type SetPatientLimit = z.output<typeof setPatientLimitBody>;

/** The same as forms post them: a number that is not typed is missing, never nought. */
export const changeUnitLimitForm = changeUnitLimitBody.extend({ value: value.optional() });
export const setPatientLimitForm = setPatientLimitBody.extend({ value: value.optional() });
