import { z } from 'zod';
import { GRADES } from '../core/codes';
import { reason, text, tooLong } from '../core/fields';
import { toRfc3339 } from '../core/instant';
import { MINUTE } from '../core/time';

const minutes = (field: string, max: number) =>
	z
		.number(`${field} is a number of minutes.`)
		.int(`${field} is a whole number of minutes.`)
		.min(1, { error: ({ input }) => `${field} is ${String(input)}: it is at least 1 minute.` })
		.max(max, { error: ({ input }) => `${field} is ${String(input)}: it is at most ${max} minutes.` });

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

export const etaBody = z.strictObject({ etaMinutes: takeBody.shape.etaMinutes.unwrap() });

export const informBody = z.strictObject({ informed: text('Which physician knows of it', 200) });

const WHOM = 'To whom is open: choose a person.';
export const passBody = z.strictObject({
	to: z.string(WHOM).min(1, WHOM).max(64, tooLong('To whom', 64)),
	reason: reason('The reason')
});

export const withdrawBody = z.strictObject({ reason: reason('The reason') });

export const settleBody = z.strictObject({
	outcome: text('The outcome', 200),
	note: text('The note', 4000),
	informed: text('Who was informed', 200).optional(),
	recheckMinutes: minutes('The time until the re-check', 24 * 60).optional()
});

/** The settling as a page asks for it: after a high one nothing is chosen beforehand about measuring again. */
export const settleForm = settleBody.extend({
	recheckMinutes: z.string('Measure again in: choose a time, or that it is not needed.')
});

export const emptyBody = z.strictObject({});

const PLAIN_LINK_DEEDS = ['take', 'untake', 'arrive', 'confirm'] as const;
export const LINK_DEEDS = [...PLAIN_LINK_DEEDS, 'eta'] as const;

/** What the page of a secret link can do; without a word it takes, as the bare button of an old page does. */
export const linkDeed = z.preprocess(
	(form) => ({ deed: 'take', ...(form as object) }),
	z.discriminatedUnion('deed', [
		z.object({ deed: z.literal(PLAIN_LINK_DEEDS) }),
		z.object({
			deed: z.literal('eta'),
			etaMinutes: z.coerce.number().pipe(etaBody.shape.etaMinutes)
		})
	])
);
export type LinkDeed = z.output<typeof linkDeed>;

/** The form of the escalation page; the same fields as the JSON call. */
export const takeForm = z.object({ etaMinutes: takeBody.shape.etaMinutes });

const HOW_URGENT = 'How urgent is open: choose high, medium or low.';

/**
 * The form that raises one. `grade` comes empty when nobody has chosen, so that a page can ask for it without
 * proposing one; a high one says by when somebody is needed. Every message names its field in plain words.
 */
export const raiseForm = z
	.object({
		grade: z
			.enum(['', ...GRADES], HOW_URGENT)
			.refine((grade) => grade !== '', HOW_URGENT)
			.prefault(''),
		situation: raiseBody.shape.situation,
		background: raiseBody.shape.background,
		assessment: raiseBody.shape.assessment,
		request: raiseBody.shape.request,
		/** In how many minutes somebody is needed at the latest; a page knows no instants before it is sent. */
		neededInMinutes: minutes('The time until somebody is needed', 24 * 60).optional(),
		toldInPerson: z.string().max(64).optional(),
		sessionId: raiseBody.shape.sessionId,
		threadId: raiseBody.shape.threadId
	})
	.superRefine(({ grade, neededInMinutes }, context) => {
		if (grade === 'high' && neededInMinutes === undefined) {
			const message = 'By when is open: a high one says within how many minutes somebody is needed.';
			context.addIssue({ code: 'custom', path: ['neededInMinutes'], message });
		}
	});
export type RaiseFilled = z.output<typeof raiseForm>;

/** The call that a filled form asks for, at the instant when it is sent. */
export function callOf(filled: RaiseFilled, now: number): RaiseInput {
	const { neededInMinutes, toldInPerson, ...call } = filled;
	return {
		...call,
		...(toldInPerson ? { toldInPerson } : {}),
		...(neededInMinutes === undefined ? {} : { neededBy: toRfc3339(now + neededInMinutes * MINUTE) })
	};
}
