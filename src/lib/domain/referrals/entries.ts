/** What an entry of a thread is: an ask and its answer stand apart from talk and from what merely happened. */
export const ENTRY_KINDS = ['ask', 'answer', 'note', 'session', 'event'] as const;
export type EntryKind = (typeof ENTRY_KINDS)[number];

/** What an entry can point at. */
export const REF_KINDS = [
	'referral',
	'clearance',
	'session',
	'escalation',
	'visit',
	'wound-note',
	'line',
	'oxygen-note'
] as const;
export type RefKind = (typeof REF_KINDS)[number];
