/**
 * The ways out of the product. Voice is the last one, for calls for help alone: a telephone that rings and waits for a
 * digit where a text did not get through. Push is beside the text: a notice on the devices on which its reader wants
 * some.
 */
export const MESSAGE_CHANNELS = ['sms', 'mail', 'voice', 'push'] as const;
export type MessageChannel = (typeof MESSAGE_CHANNELS)[number];

export const MESSAGE_KINDS = [
	'escalation',
	'notice',
	'reminder',
	'answer',
	'mail',
	'visit',
	'page',
	'trial'
] as const;
export type MessageKind = (typeof MESSAGE_KINDS)[number];

export const MESSAGE_STATES = [
	'ready',
	'sending',
	'accepted',
	'delivered',
	'undelivered',
	'failed',
	'skipped',
	'cancelled',
	'held'
] as const;
export type MessageState = (typeof MESSAGE_STATES)[number];

/** What a message is about: where its cause is found. */
export const MESSAGE_CAUSES = [
	'escalation',
	'visit',
	'referral',
	'inbound',
	'account',
	'episode',
	'page'
] as const;
export type MessageCause = (typeof MESSAGE_CAUSES)[number];

export const ATTEMPT_OUTCOMES = ['accepted', 'permanent', 'transient', 'unknown'] as const;
