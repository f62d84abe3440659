import { z } from 'zod';
import { PRIORITIES, SERVICES } from '../core/codes';
import { reason, text } from '../core/fields';

export const referBody = z.strictObject({
	service: z.enum(SERVICES, `The service is one of ${SERVICES.join(', ')}.`),
	priority: z.enum(PRIORITIES, `The priority is one of ${PRIORITIES.join(', ')}.`),
	question: text('The question', 4000)
});

/** The form that refers; its message names the field as the page does. */
export const referForm = referBody.extend({
	question: text('What you ask', 4000),
	priority: z.enum(PRIORITIES, 'How soon: choose one.')
});

/** Why a referral ends, as its forms ask for it: to close it no word is needed. */
export const reasonForm = z.object({ reason: reason('Reason') });
export const maybeReasonForm = reasonForm.partial();

/** Accepting and closing need no words; declining and withdrawing do. */
export const acceptBody = z.strictObject({ reason: reason('The reason').optional() });
export const declineBody = z.strictObject({ reason: reason('The reason') });

export const entryBody = z.strictObject({
	body: text('The entry', 8000),
	mentions: z.array(z.string().max(64)).max(20, 'An entry names at most 20 people.').optional(),
	files: z.array(z.string()).max(0, 'files cannot be attached yet.').optional()
});
