import { z } from 'zod';
import { APPROACHES, RHYTHMS, SEXES } from '../core/codes';
import { text } from '../core/fields';

const level = z
	.number('level is a number from 1 to 6.')
	.int('level is a whole number from 1 to 6.')
	.min(1, 'level is at least 1.')
	.max(6, 'level is at most 6.');

const instant = (field: string) =>
	z.iso.datetime({ offset: true, error: `${field} is an instant like 2026-12-01T09:30:00Z.` });

export const admitBody = z.strictObject({
	patient: z.strictObject({
		name: text('name', 120),
		birthDate: z.iso.date('birthDate is a date like 1958-09-05.'),
		sex: z.enum(SEXES, `sex is one of ${SEXES.join(', ')}.`),
		mrn: text('mrn', 40),
		phone: z.string().trim().max(30, 'phone has at most 30 characters.').optional(),
		language: z
			.string()
			.regex(/^[a-z]{2}(-[A-Z]{2})?$/, 'language is a tag like en or es.')
			.optional(),
		smsConsent: z.boolean('smsConsent is true or false.').optional()
	}),
	operation: z
		.strictObject({
			procedure: text('procedure', 120),
			approach: z.enum(APPROACHES, `approach is one of ${APPROACHES.join(', ')}.`),
			operatedAt: instant('operatedAt')
		})
		.optional(),
	surgeonId: z.string().min(1).max(120).optional(),
	unit: z.string().min(1, 'unit is empty.').max(64),
	bed: text('bed', 12),
	level: level.optional(),
	betaBlocked: z.boolean('betaBlocked is true, false or null.').nullable().optional(),
	rhythm: z.enum(RHYTHMS, `rhythm is one of ${RHYTHMS.join(', ')}.`).optional()
});
export type AdmitInput = z.infer<typeof admitBody>;
