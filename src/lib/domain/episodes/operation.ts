import { z } from 'zod';
import { APPROACHES } from '../core/codes';
import { text, tooLong } from '../core/fields';
import { isZone } from '../core/time';

/** The parts of an operation's record that can be corrected. */
export const OPERATION_FIELDS = ['procedure', 'approach', 'operatedAt', 'surgeonId'] as const;
export type OperationField = (typeof OPERATION_FIELDS)[number];

export const operation = z.strictObject({
	procedure: text('The procedure', 120),
	approach: z.enum(APPROACHES, `The approach is one of ${APPROACHES.join(', ')}.`),
	operatedAt: z.iso.datetime({
		offset: true,
		error: 'The time of the operation is an instant like 2026-12-01T09:30:00Z.'
	})
});

/** What the record said before a correction: one for each field that changed. */
export interface Correction {
	field: OperationField;
	before: string | null;
	by: string;
	at: string;
}

/**
 * An operation after the admission: a further one, which a return to theatre is, or with `corrects` what the record
 * should have said of one that stands there.
 */
export const recordOperationBody = operation.extend({
	surgeonId: z.string().min(1, 'The surgeon is empty.').max(120).optional(),
	corrects: z.string().min(1, 'The operation to correct is empty.').max(64).optional()
});
export type RecordOperation = z.infer<typeof recordOperationBody>;

/** What is said of a zone that nobody knows. */
export function noZone(value: unknown, called = 'zone'): string {
	const shown = typeof value === 'string' ? `'${value.slice(0, 60)}'` : 'no text';
	return `${called} is ${shown}: it must be the name of a time zone such as Europe/Dublin.`;
}

/** Where a patient is by the clock, by the name of the time zone database. */
export const zone = z
	.string({ error: ({ input }) => noZone(input) })
	.refine(isZone, { error: ({ input }) => noZone(input) });

/** The tag of the language in which a patient is written to. */
export const language = z.string().regex(/^[a-z]{2}(-[A-Z]{2})?$/, 'The language is a tag like en or es.');

/** The number, language, zone and consent by which a patient is reached; what is left out stays as it is. */
export const contactBody = z.strictObject({
	phone: z.string().trim().max(30, tooLong('The telephone number', 30)).nullish(),
	language: language.optional(),
	smsConsent: z.boolean('The consent to text messages is true or false.').optional(),
	email: z.email('The e-mail address is one address, such as name@post.example.').max(254).nullish(),
	mailConsent: z.boolean('The consent to mails is true or false.').optional(),
	/** Texts come at the daytime of this zone. */
	zone: zone.optional()
});
export type Contact = z.infer<typeof contactBody>;
