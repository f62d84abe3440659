import { randomBytes } from 'node:crypto';
import type { Fault } from '../common/faults';
import type { FakeSettings } from '../common/settings';

export const SMS_MODES = [
	'ok',
	'refuse',
	'500',
	'429',
	'slow',
	'accept-then-drop',
	'undelivered',
	'duplicate-callbacks'
] as const;
export type SmsMode = (typeof SMS_MODES)[number];

export type MessageStatus = 'queued' | 'sent' | 'delivered' | 'undelivered' | 'received';

/** `out` goes from the application to the phone, `in` is a reply. Times are milliseconds UTC. */
export interface Message {
	sid: string;
	at: number;
	updatedAt: number;
	sentAt: number | null;
	number: string;
	direction: 'in' | 'out';
	body: string;
	status: MessageStatus;
	errorCode: number | null;
	statusCallback: string | null;
}

export type CallStatus = 'queued' | 'ringing' | 'in-progress' | 'completed' | 'no-answer' | 'canceled';

/** One telephone call: what was said so far, the digits pressed, and where the next digit is posted to. */
export interface Call {
	sid: string;
	at: number;
	updatedAt: number;
	startedAt: number | null;
	endedAt: number | null;
	number: string;
	status: CallStatus;
	said: string[];
	pressed: string;
	digitsTo: string | null;
	statusCallback: string | null;
	callbackEvents: string[];
}

/** A phone that was written to, that has replied, or whose owner the application has told. */
export interface Phone {
	number: string;
	owner: string | null;
	messages: Message[];
	calls: Call[];
}

export interface Gateway {
	settings: FakeSettings;
	fault: Fault<SmsMode>;
	phones: Map<string, Phone>;
	messages: Map<string, Message>;
	calls: Map<string, Call>;
	/** Numbers that replied STOP; the gateway refuses to write to them until they reply START. */
	optedOut: Set<string>;
	/** Grows with every change, so that a page can ask whether there is anything new. */
	version: number;
	/** Differs after a restart, when `version` begins again. */
	boot: string;
}

const NUMBER = /^\+[1-9]\d{6,14}$/;

/** An empty gateway. Everything is kept in memory and is gone with the process. */
export function createGateway(settings: FakeSettings): Gateway {
	return {
		settings,
		fault: { mode: 'ok', left: null },
		phones: new Map(),
		messages: new Map(),
		calls: new Map(),
		optedOut: new Set(),
		version: 0,
		boot: randomBytes(6).toString('hex')
	};
}

/** An identifier as the gateway makes them: two letters (SM, CA) and 32 hexadecimal digits. */
export function newSid(prefix: 'SM' | 'CA'): string {
	return prefix + randomBytes(16).toString('hex');
}

/** Whether this is a telephone number in E.164 form. */
export function isNumber(text: string): boolean {
	return NUMBER.test(text);
}

/** The phone of this number, which is added when it was not known. */
export function phoneOf(gateway: Gateway, number: string): Phone {
	const known = gateway.phones.get(number);
	if (known) {
		return known;
	}
	const phone: Phone = { number, owner: null, messages: [], calls: [] };
	gateway.phones.set(number, phone);
	gateway.version += 1;
	return phone;
}

/** Puts a message on its phone. */
export function addMessage(
	gateway: Gateway,
	fields: Pick<Message, 'number' | 'direction' | 'body' | 'status' | 'statusCallback'>
): Message {
	const at = Date.now();
	const sentAt = fields.status === 'queued' ? null : at;
	const message: Message = { sid: newSid('SM'), at, updatedAt: at, sentAt, errorCode: null, ...fields };
	gateway.messages.set(message.sid, message);
	phoneOf(gateway, message.number).messages.push(message);
	gateway.version += 1;
	return message;
}
