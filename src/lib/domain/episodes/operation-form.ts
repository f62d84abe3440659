/** An operation and a contact as pages ask for them: flat, in wall time, everything a text. */
import { z } from 'zod';
import { APPROACHES } from '../core/codes';
import { noDay, noTime, text } from '../core/fields';
import { toRfc3339 } from '../core/instant';
import { instantOf, isLocalDate, isLocalTime, isZone, type Zone } from '../core/time';
import { chosen, line, typedDay, typedTime } from './admit-form';
import { language, noZone, type Contact, type RecordOperation } from './operation';

/** Whether the record is put right, or gets a further operation. */
export const OPERATION_DEEDS = ['corrects', 'further'] as const;

export const operationForm = z.object({
	which: chosen(OPERATION_DEEDS, 'What you are recording: choose one.'),
	procedure: text('The procedure', 120).default(''),
	approach: chosen(APPROACHES, 'Approach: choose one.'),
	operatedOn: typedDay
		.default('')
		.refine(isLocalDate, { error: ({ input }) => noDay('Day of the operation', String(input)) }),
	operatedTime: typedTime
		.default('')
		.refine(isLocalTime, { error: ({ input }) => noTime('Time of the operation', String(input)) }),
	surgeonId: line('The surgeon', 120)
});
export type OperationForm = z.output<typeof operationForm>;

/** @param known the operation on record that a correction is about; null for none */
export function toOperation(form: OperationForm, known: string | null, zone: Zone): Record<string, unknown> {
	return {
		procedure: form.procedure,
		approach: form.approach,
		operatedAt: toRfc3339(instantOf(form.operatedOn, form.operatedTime, zone)),
		surgeonId: form.surgeonId || undefined,
		corrects: form.which === 'corrects' && known !== null ? known : undefined
	} satisfies Record<keyof RecordOperation, unknown>;
}

export const contactForm = z.object({
	phone: line('The telephone number', 30),
	smsConsent: z.boolean().default(false),
	email: line('The e-mail address', 254),
	mailConsent: z.boolean().default(false),
	language: language.default('en'),
	zone: z
		.string()
		.refine(isZone, { error: ({ input }) => noZone(input, 'Time zone of the patient') })
		.default('')
});
export type ContactForm = z.output<typeof contactForm>;

/** An empty number or address takes away the one on record. */
export function toContact({ phone, email, ...rest }: ContactForm): Record<keyof Contact, unknown> {
	return { ...rest, phone: phone || null, email: email || null };
}
