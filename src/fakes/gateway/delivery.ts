import { setTimeout as delay } from 'node:timers/promises';
import { API_VERSION } from './rest';
import type { Gateway, Message, MessageStatus, SmsMode } from './state';
import { postWebhook } from './webhook';

const STEP_MS = 60;
/** 'Unreachable destination handset', the gateway's number for a phone that is off or out of reach. */
const UNREACHABLE = 30003;

/**
 * Moves a message from queued to its end and posts each status to the message's callback address, in order.
 * Delivery does not wait for the callbacks, as the network does not. In the mode `duplicate-callbacks` the whole
 * row of callbacks comes a second time, so that an old status follows the last one.
 */
export function startDelivery(gateway: Gateway, message: Message, mode: SmsMode): void {
	const end: MessageStatus = mode === 'undelivered' ? 'undelivered' : 'delivered';
	const row: MessageStatus[] = ['queued', 'sent', end];
	let posted: Promise<unknown> = Promise.resolve();
	const tell = (status: MessageStatus) => {
		posted = posted.then(() => postStatus(gateway, message, status));
	};
	const walk = async () => {
		for (const status of row) {
			await delay(STEP_MS);
			setStatus(gateway, message, status);
			tell(status);
		}
		if (mode === 'duplicate-callbacks') {
			row.forEach(tell);
		}
	};
	void walk();
}

function setStatus(gateway: Gateway, message: Message, status: MessageStatus): void {
	message.status = status;
	message.updatedAt = Date.now();
	if (status === 'sent') {
		message.sentAt = message.updatedAt;
	}
	message.errorCode = status === 'undelivered' ? UNREACHABLE : null;
	gateway.version += 1;
}

async function postStatus(gateway: Gateway, message: Message, status: MessageStatus): Promise<void> {
	const { accountSid, authToken, from } = gateway.settings;
	if (!message.statusCallback) {
		return;
	}
	const fields = {
		AccountSid: accountSid,
		ApiVersion: API_VERSION,
		From: from,
		To: message.number,
		MessageSid: message.sid,
		MessageStatus: status,
		SmsSid: message.sid,
		SmsStatus: status,
		...(status === 'undelivered' ? { ErrorCode: String(UNREACHABLE) } : {})
	};
	await postWebhook(authToken, message.statusCallback, fields).catch(() => null);
}
