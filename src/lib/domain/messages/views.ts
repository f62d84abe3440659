import type { PatientLine } from '../episodes/views';
import type { MessageChannel } from './codes';

/** Somebody who is to be called, because a text did not do it. */
export interface Reachable {
	name: string;
	/** In E.164 form; null where no number is known. */
	phone: string | null;
}

/** A message that did not arrive, for the person who sees to it. */
export interface FailedMessageView {
	id: string;
	/** What it was to say. A secret link in it is left out. */
	body: string;
	channel: MessageChannel;
	/** Whom it was for; null where the number belongs to nobody we know. */
	to: Reachable | null;
	/** Whom it was about. */
	patient: PatientLine | null;
	episodeId: string | null;
	/** When it was written, RFC 3339. */
	createdAt: string;
	/** Why it did not arrive, as the message log has it. */
	reason: string | null;
	/** True once somebody has seen to it. */
	settled: boolean;
}

/** A text that no rule understood, for the person who answers it. */
export interface InboundTextView {
	id: string;
	body: string;
	from: Reachable;
	patient: PatientLine | null;
	episodeId: string | null;
	/** When it came, RFC 3339. */
	at: string;
	settled: boolean;
	/** What was done about it, by whom and when (RFC 3339); null while it is open, and where no note was asked for. */
	done: { note: string; by: string; at: string } | null;
}

/** A way out of the product that does not work now. */
export interface Trouble {
	channel: MessageChannel;
	/** When it began, RFC 3339. */
	since: string;
	/** How many messages are due and wait for it. */
	waiting: number;
}
