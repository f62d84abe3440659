/**
 * Admission as a page asks for it: flat, in wall time, everything a text. `toAdmission` makes of it the body of
 * the JSON API, whose checks have the last word.
 */
import { z } from 'zod';
import { APPROACHES, LEVELS, RHYTHMS, SEXES } from '../core/codes';
import { noDay, noTime, text, tooLong } from '../core/fields';
import { toRfc3339 } from '../core/instant';
import { readDate, readTime } from '../core/typed-date';
import { MESSAGE_LANGUAGES } from '../messages/templates/wording';
import { instantOf, isLocalDate, isLocalTime, isZone, type Zone } from '../core/time';
import type { AdmitInput } from './forms';
import { noZone } from './operation';

/** What is known about a drug that slows the heart: three answers, because not knowing is one. */
export const DRUG_ANSWERS = ['yes', 'no', 'unknown'] as const;
export type DrugAnswer = (typeof DRUG_ANSWERS)[number];

/** A text that may be left empty. */
export const line = (field: string, max: number) =>
	z.string().trim().max(max, tooLong(field, max)).default('');
/** Stays a text: a browser may post anything, and what was posted is shown again. */
const isIn = (list: readonly string[], value: string): boolean => list.includes(value);
/** One of a list, and never none. */
export const chosen = (list: readonly string[], message: string) =>
	z
		.string()
		.default('')
		.refine((value) => isIn(list, value), message);
const known = (list: readonly string[], field: string) =>
	z
		.string()
		.default('')
		.refine((value) => value === '' || isIn(list, value), `${field} is not one of the list.`);

/** What is no day stays as it was typed, so that it can be put right. */
export const typedDay = z.string().transform((typed) => readDate(typed) ?? typed);

/** What is no time stays as it was typed, too. */
export const typedTime = z
	.string()
	.max(20, tooLong('The time of the operation', 20))
	.transform((typed) => readTime(typed) ?? typed);

/** Where somebody is by the clock, chosen from a list; empty for no choice. */
const optionalZone = z
	.string()
	.default('')
	.refine((value) => value === '' || isZone(value), {
		error: ({ input }) => noZone(input, 'Time zone of the patient')
	});

export const admitForm = z
	.object({
		name: text("The patient's name", 120).default(''),
		birthDate: typedDay
			.default('')
			.refine(isLocalDate, { error: ({ input }) => noDay('Birth date', String(input)) }),
		sex: chosen(SEXES, 'Sex: choose one.'),
		mrn: text('The hospital number', 40).default(''),
		/** Ticked when the record has another name and this is the name now. */
		confirmName: z.boolean().default(false),
		phone: line('The telephone number', 30),
		smsConsent: z.boolean().default(false),
		email: line('The e-mail address', 254),
		mailConsent: z.boolean().default(false),
		language: known(MESSAGE_LANGUAGES, 'The language').default('en'),
		/** Empty for what is on record, which for a new patient is the hospital's. */
		zone: optionalZone,
		unit: z.string().min(1, 'Unit: choose one.').max(64, tooLong('Unit', 64)).default(''),
		/** Empty for a gym; whether the unit has beds knows the server. */
		bed: line('The bed', 12),
		procedure: line('The procedure', 120),
		approach: known(APPROACHES, 'The approach'),
		operatedOn: typedDay.default(''),
		operatedTime: typedTime.default(''),
		surgeonId: line('The surgeon', 120),
		level: chosen(LEVELS.map(String), 'Level: choose 1 to 6.').default('1'),
		betaBlocked: chosen(DRUG_ANSWERS, 'Rate-slowing drug: choose one.').default('unknown'),
		rhythm: known(RHYTHMS, 'The rhythm')
	})
	.superRefine((form, context) => {
		for (const [field, message] of operationProblems(form)) {
			context.addIssue({ code: 'custom', path: [field], message, input: form[field] });
		}
	});
export type AdmitForm = z.infer<typeof admitForm>;

type OperationFields = Pick<AdmitForm, 'procedure' | 'approach' | 'operatedOn' | 'operatedTime'>;

/** An operation is given whole or not at all: day, precautions and clearances count from it. */
function operationProblems(form: OperationFields): [keyof OperationFields, string][] {
	const { procedure, approach, operatedOn, operatedTime } = form;
	if ([procedure, approach, operatedOn, operatedTime].every((value) => value === '')) {
		return [];
	}
	const problems: [keyof OperationFields, boolean, string][] = [
		['procedure', procedure !== '', 'Procedure: say which operation, or leave all four fields empty.'],
		['approach', approach !== '', 'Approach: choose one, or leave all four fields empty.'],
		['operatedOn', isLocalDate(operatedOn), noDay('Day of the operation', operatedOn)],
		['operatedTime', isLocalTime(operatedTime), noTime('Time of the operation', operatedTime)]
	];
	return problems.flatMap(([field, right, message]) => (right ? [] : [[field, message]]));
}

/** What is sent to the JSON API of a form that is valid; `AdmitInput` once `admitBody` has read it. */
export function toAdmission(form: AdmitForm, zone: Zone): Record<keyof AdmitInput, unknown> {
	return {
		patient: {
			name: form.name,
			birthDate: form.birthDate,
			sex: form.sex,
			mrn: form.mrn,
			phone: form.phone || undefined,
			// An empty box says nothing: it must not take away a consent that was given before.
			smsConsent: form.smsConsent || undefined,
			email: form.email || undefined,
			mailConsent: form.mailConsent || undefined,
			language: form.language || undefined,
			zone: form.zone || undefined
		},
		operation: form.procedure
			? {
					procedure: form.procedure,
					approach: form.approach,
					operatedAt: toRfc3339(instantOf(form.operatedOn, form.operatedTime, zone))
				}
			: undefined,
		surgeonId: form.surgeonId || undefined,
		unit: form.unit,
		bed: form.bed || undefined,
		confirmName: form.confirmName || undefined,
		level: Number(form.level),
		betaBlocked: form.betaBlocked === 'unknown' ? null : form.betaBlocked === 'yes',
		rhythm: form.rhythm || undefined
	};
}

/** The field of the form that a pointer into the body of the JSON API means: `/patient/mrn` is `mrn`. */
export function formFieldOf(pointer: string): string {
	const field = pointer.split('/').at(-1) ?? '';
	return field === 'operatedAt' ? 'operatedOn' : field;
}
