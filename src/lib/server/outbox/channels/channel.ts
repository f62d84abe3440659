import { MESSAGE_CHANNELS, type MessageChannel } from '$lib/domain/messages/codes';
import type { Outcome } from '$lib/domain/messages/outcome';

/** A message as it goes out: the address as it is now, the link filled in. */
export interface Outgoing {
	/** The outbox row's; the same for every attempt. */
	id: string;
	/** A telephone number in E.164 form, an e-mail address, or where the push service takes messages for a device. */
	to: string;
	name: string | null;
	/** The tag of the language that the text is written in; English where left out. */
	language?: string;
	subject: string | null;
	body: string;
	/** The calendar file that goes with a mail; null or left out for none. */
	calendar?: string | null;
	/** Of a notice on a device alone. */
	notice?: Notice;
}

/** What a notice has beside its words. */
export interface Notice {
	/** The device's keys, in base64url. */
	keys: { p256dh: string; auth: string };
	/** The page that it opens, a path of ours or a whole address. */
	link: string;
	/** Names what it is about: a later notice of the same takes the place of an earlier one. */
	topic: string;
	urgent: boolean;
	/** For so long it is of use. */
	ttlSeconds: number;
}

/** How one attempt ended. `code` is the gateway's status or error code, or that of the connection; never prose. */
export interface Sent {
	outcome: Outcome;
	code: string | null;
}

/** One way out of the product. Neither function throws for what a gateway does. */
export interface Channel {
	send(message: Outgoing): Promise<Sent>;
	/**
	 * The gateway's identifiers of messages with this receiver and this text, newest first, to find out whether an
	 * attempt of unknown outcome went through; null when the gateway gave no usable answer. The channel as a whole
	 * has null here when it cannot be asked.
	 */
	lookUp: ((message: Outgoing) => Promise<string[] | null>) | null;
	/**
	 * What became of a message that was accepted under this identifier, in the gateway's own word; null when it gave
	 * no usable answer. Left out where the gateway cannot be asked.
	 */
	statusOf?: (providerId: string) => Promise<Told | null>;
	/** Is the gateway there, and does it know us? Nothing is sent for it. Left out where it cannot be asked. */
	probe?: () => Promise<boolean>;
	/**
	 * End what is under way, such as a telephone that rings; false where it could not be, and may be tried again. Left
	 * out where nothing is ever under way.
	 */
	end?: (providerId: string) => Promise<boolean>;
}

/** A status as the gateway words it, with its number of the error where there was one. */
export interface Told {
	status: string;
	errorCode: string | null;
}

export const CHANNELS = MESSAGE_CHANNELS;
export type ChannelName = MessageChannel;

/** The channels of this process; null or left out for one without a gateway, whose messages are held. */
export type Channels = Record<'sms' | 'mail', Channel | null> & Partial<Record<ChannelName, Channel | null>>;
