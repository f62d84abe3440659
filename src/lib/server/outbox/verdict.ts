import type { SkipReason as ReminderSkip } from '$lib/domain/visits/reminders';

/** Somebody has the call, or it has ended. Taking back within the moment sends what was skipped for it after all. */
export const NOT_WAITING = 'escalation is not waiting for anybody';

/** Why a message is not sent after all. The words stand in the message log. */
export type SkipReason =
	| ReminderSkip
	| typeof NOT_WAITING
	| 'nobody else has the escalation'
	| 'account disabled'
	| 'link used, expired or not theirs'
	| 'invitation used'
	| 'no e-mail address'
	| 'nobody to send to'
	| 'notices are turned off';

export interface Receiver {
	/** A telephone number, an e-mail address or a device's endpoint, read at the moment of sending. */
	to: string;
	name: string | null;
	/** The keys of a device, where it is one. */
	keys?: { p256dh: string; auth: string };
	/** The language that they are written to in; left out for staff, who are written to in English. */
	language?: string;
}

export type Verdict =
	| { kind: 'send'; receiver: Receiver }
	| { kind: 'wait'; until: number }
	| { kind: 'skip'; reason: SkipReason }
	/** Still wanted, but it came to nothing in time: somebody has to see to it. */
	| { kind: 'fail'; reason: 'expired' };

export const skip = (reason: SkipReason): Verdict => ({ kind: 'skip', reason });
