import { z } from 'zod';
import { PRIORITIES, SERVICES } from '../core/codes';
import { reason, text } from '../core/fields';

export const referBody = z.strictObject({
	service: z.enum(SERVICES, `service is one of ${SERVICES.join(', ')}.`),
	priority: z.enum(PRIORITIES, `priority is one of ${PRIORITIES.join(', ')}.`),
	question: text('question', 4000)
});

/** Accepting and closing need no words; declining and withdrawing do. */
export const acceptBody = z.strictObject({ reason: reason('reason').optional() });
export const declineBody = z.strictObject({ reason: reason('reason') });

export const entryBody = z.strictObject({
	body: text('body', 8000),
	mentions: z.array(z.string().max(64)).max(20, 'mentions has at most 20 members.').optional(),
	files: z.array(z.string()).max(0, 'files cannot be attached yet.').optional()
});
