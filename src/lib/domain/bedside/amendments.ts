import { z } from 'zod';
import { text } from '../core/fields';
import { SESSION_AMENDMENTS } from './amended';

export const amendSessionBody = z.strictObject({
	sessionId: z.string().min(1, 'The session is empty.').max(64),
	kind: z.enum(SESSION_AMENDMENTS, `The kind is one of ${SESSION_AMENDMENTS.join(', ')}.`),
	body: text('What is to be said about it', 2000)
});
export type AmendSession = z.infer<typeof amendSessionBody>;
