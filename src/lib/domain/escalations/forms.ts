import { z } from 'zod';
import { GRADES } from '../core/codes';
import { reason, text } from '../core/fields';

const minutes = (field: string, max: number) =>
	z
		.number(`${field} is a number of minutes.`)
		.int(`${field} is a whole number of minutes.`)
		.min(1, `${field} is at least 1 minute.`)
		.max(max, `${field} is at most ${max} minutes.`);

export const raiseBody = z.strictObject({
	grade: z.enum(GRADES, `The grade is one of ${GRADES.join(', ')}.`),
	situation: text('The situation', 2000),
	background: text('The background', 2000),
	assessment: text('The assessment', 2000),
	request: text('The request', 2000),
	neededBy: z.iso
		.datetime({ offset: true, error: 'The time it is needed by is an instant like 2026-12-01T14:05:00Z.' })
		.optional(),
	toldInPerson: z.string().min(1).max(64).optional(),
	sessionId: z.string().min(1).max(64).optional(),
	threadId: z.string().min(1).max(64).optional()
});
export type RaiseInput = z.infer<typeof raiseBody>;

export const takeBody = z.strictObject({
	etaMinutes: minutes('The time until you are there', 240).optional()
});

export const passBody = z.strictObject({ to: z.string().min(1).max(64), reason: reason('The reason') });

export const settleBody = z.strictObject({
	outcome: text('The outcome', 200),
	note: text('The note', 4000),
	informed: text('Who was informed', 200).optional(),
	recheckMinutes: minutes('The time until the re-check', 24 * 60).optional()
});

export const emptyBody = z.strictObject({});

/** The form of the escalation page; the same fields as the JSON call. */
export const takeForm = z.object({ etaMinutes: takeBody.shape.etaMinutes });

/**
 * The form that raises one. `grade` may come empty, so that a page can ask for it without proposing one; the
 * action refuses it then.
 */
export const raiseForm = z.object({
	grade: z.enum(['', ...GRADES], `The grade is one of ${GRADES.join(', ')}.`).default(''),
	situation: raiseBody.shape.situation,
	background: raiseBody.shape.background,
	assessment: raiseBody.shape.assessment,
	request: raiseBody.shape.request,
	sessionId: raiseBody.shape.sessionId
});
