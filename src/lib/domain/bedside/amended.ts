/** What pages and rules need of amendments; apart from the schema, so that no page fetches it for one question. */

/** What can be said about a session once it is on record: more about it, or that it never happened as it stands. */
export const SESSION_AMENDMENTS = ['amended', 'entered-in-error'] as const;
export type SessionAmendmentKind = (typeof SESSION_AMENDMENTS)[number];

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
