import { z } from 'zod';
import { text } from '../core/fields';

/** What can be said about a session once it is on record: more about it, or that it never happened as it stands. */
export const SESSION_AMENDMENTS = ['amended', 'entered-in-error'] as const;
export type SessionAmendmentKind = (typeof SESSION_AMENDMENTS)[number];

export const amendSessionBody = z.strictObject({
	sessionId: z.string().min(1, 'The session is empty.').max(64),
	kind: z.enum(SESSION_AMENDMENTS, `The kind is one of ${SESSION_AMENDMENTS.join(', ')}.`),
	body: text('What is to be said about it', 2000)
});
export type AmendSession = z.infer<typeof amendSessionBody>;

/** One amendment as pages show it. */
export interface SessionAmendment {
	kind: SessionAmendmentKind;
	body: string;
	by: string;
	at: string;
}

/** Whether a session was entered in error: it stays on record and counts for nothing. */
export function isInError({
	amendments
}: {
	amendments: readonly { kind: SessionAmendmentKind }[];
}): boolean {
	return amendments.some(({ kind }) => kind === 'entered-in-error');
}
