/**
 * The status of a message or a call at the SMS gateway. Its callbacks come twice, late and in any order; a status never
 * moves backwards, and one that ends a message stays, except that a delivery outweighs the word that it failed.
 */
export const SMS_STATUSES = ['queued', 'sending', 'sent', 'delivered', 'undelivered', 'failed'] as const;
export type SmsStatus = (typeof SMS_STATUSES)[number];

const RANK: Record<SmsStatus, number> = {
	queued: 0,
	sending: 1,
	sent: 2,
	delivered: 3,
	undelivered: 3,
	failed: 3
};

/** The status after a callback: the further of the two; of two final ones the first, but delivery outweighs. */
export function laterStatus(known: SmsStatus | null, told: SmsStatus): SmsStatus {
	if (known === null || RANK[told] > RANK[known]) {
		return told;
	}
	return told === 'delivered' ? told : known;
}

/** Other words for the same, and what a call says where a text says ours. A call that was picked up is delivered. */
const OTHER_WORDS: ReadonlyMap<string, SmsStatus> = new Map([
	['accepted', 'queued'],
	['scheduled', 'queued'],
	['read', 'delivered'],
	['initiated', 'queued'],
	['ringing', 'sending'],
	['in-progress', 'sent'],
	['completed', 'delivered'],
	['busy', 'undelivered'],
	['no-answer', 'undelivered'],
	['canceled', 'undelivered']
]);

/** The words of the gateway in ours; null for one we do not know, which then changes nothing. */
export function readStatus(word: string): SmsStatus | null {
	const status = OTHER_WORDS.get(word) ?? word;
	return SMS_STATUSES.find((known) => known === status) ?? null;
}

/** Whether the message did not arrive for certain. */
export function hasFailed(status: SmsStatus): boolean {
	return status === 'undelivered' || status === 'failed';
}
