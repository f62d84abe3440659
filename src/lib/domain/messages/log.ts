/** The message log as administrators see it: how each message fared, and nothing of the patient it is about. */
import type { Role } from '../core/codes';
import type { MessageCause, MessageChannel, MessageKind, MessageState } from './codes';

/**
 * Whom a message is for. Of a patient, and of a number that belongs to nobody we know, the last digits of the number
 * are told and no name: an administrator sees no patients.
 */
export type LogReceiver =
	| { kind: 'staff'; name: string; role: Role }
	| { kind: 'patient'; number: string | null }
	| { kind: 'nobody'; number: string | null };

export interface LogLine {
	id: string;
	kind: MessageKind;
	channel: MessageChannel;
	to: LogReceiver;
	state: MessageState;
	/** Why it is in this state, in the words of the log; null where nothing is to be said. */
	reason: string | null;
	attempts: number;
	/** RFC 3339. */
	createdAt: string;
}

/** What happened to a message, in order; all instants RFC 3339. */
export type LogEvent =
	| { what: 'written'; at: string }
	| { what: 'attempt'; at: string; endedAt: string; number: number; outcome: string; code: string | null }
	| { what: 'told'; at: string; status: string; errorCode: string | null }
	| { what: 'resent'; at: string; by: string; reason: string }
	| { what: 'handled'; at: string; by: string };

/** One message's whole story. */
export interface MessageStory extends LogLine {
	/** What caused it, and the identifier of that. */
	cause: { kind: MessageCause; id: string };
	subject: string | null;
	/** Its text, `{link}` standing for the secret link; null once it was removed after its time. */
	body: string | null;
	/** What the gateway calls it; null while it has none. */
	providerId: string | null;
	/** When it is tried next; null when it is not. */
	nextAt: string | null;
	expiresAt: string;
	mayResend: boolean;
	events: LogEvent[];
}

/** What the log is narrowed by; empty where left out. */
export interface LogFilter {
	/** Part of a receiver's name, of a number, of a text, or an identifier. */
	search: string;
	state: MessageState | null;
	channel: MessageChannel | null;
}

/** The last digits of a number: enough to compare, too few to call. */
export function endOfNumber(number: string | null): string | null {
	return number === null ? null : number.slice(-4);
}

/**
 * May a person have it sent again? Not while it is under way, nor when it is known to have arrived; what was called off
 * or skipped has a reason that sending again does not take away.
 */
export function mayBeResent(state: MessageState): boolean {
	return state === 'failed' || state === 'undelivered' || state === 'accepted';
}

/**
 * Until when a message that is sent again is of use. What belongs to the hour of a visit keeps its end; everything else
 * gets as long as it had when it was written.
 */
export function endOfResent(
	message: { kind: MessageKind; createdAt: number; expiresAt: number },
	now: number
): number {
	const { kind, createdAt, expiresAt } = message;
	return kind === 'reminder' || kind === 'visit'
		? expiresAt
		: Math.max(expiresAt, now + expiresAt - createdAt);
}
