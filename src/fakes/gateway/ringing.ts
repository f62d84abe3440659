import { setTimeout as delay } from 'node:timers/promises';
import { API_VERSION, rfc2822 } from './rest';
import type { Call, CallStatus, Gateway, SmsMode } from './state';
import { readInstructions } from './twiml';
import { postWebhook, type WebhookAnswer } from './webhook';

const STEP_MS = 60;
/** A call that nobody answers with a digit is hung up after this long. */
const WAIT_FOR_DIGIT_MS = 60_000;

/** The name under which a caller asks to be told of a status. */
const EVENTS: Record<CallStatus, string> = {
	queued: 'initiated',
	ringing: 'ringing',
	'in-progress': 'answered',
	completed: 'completed',
	'no-answer': 'completed',
	canceled: 'completed'
};

/** Where the words of a call come from: markup sent along, or an address to fetch it from. */
export type Script = { markup: string } | { url: string };

/** Rings, is picked up, says its words and waits for a digit. In the mode `undelivered` nobody picks up. */
export async function ring(gateway: Gateway, call: Call, script: Script, mode: SmsMode): Promise<void> {
	for (const status of ['ringing', 'in-progress'] as const) {
		await delay(STEP_MS);
		if (isOver(call)) {
			return;
		}
		setCallStatus(gateway, call, mode === 'undelivered' && status === 'in-progress' ? 'no-answer' : status);
	}
	if (call.status !== 'in-progress') {
		return;
	}
	const markup = 'markup' in script ? script.markup : await fetchMarkup(gateway, call, script.url);
	say(gateway, call, markup, 'url' in script ? script.url : null);
	await delay(WAIT_FOR_DIGIT_MS, undefined, { ref: false });
	hangUp(gateway, call, 'completed');
}

/** Posts the digits to the address that waits for them and says what it answers. */
export async function pressDigits(
	gateway: Gateway,
	call: Call,
	digits: string
): Promise<WebhookAnswer | null> {
	const url = call.digitsTo ?? '';
	call.pressed += digits;
	call.digitsTo = null;
	gateway.version += 1;
	const fields = { ...callFields(gateway, call), Digits: digits, msg: 'Gather End' };
	const answer = await postWebhook(gateway.settings.authToken, url, fields);
	say(gateway, call, answer && answer.status < 300 ? answer.body : '', url);
	return answer;
}

/** Ends a call that is still going on. */
export function hangUp(gateway: Gateway, call: Call, status: 'completed' | 'canceled'): void {
	if (!isOver(call)) {
		call.digitsTo = null;
		setCallStatus(gateway, call, status);
	}
}

function isOver({ status }: Call): boolean {
	return status === 'completed' || status === 'no-answer' || status === 'canceled';
}

async function fetchMarkup(gateway: Gateway, call: Call, url: string): Promise<string> {
	const answer = await postWebhook(gateway.settings.authToken, url, callFields(gateway, call));
	return answer?.body ?? '';
}

/** Says the words; without a digit to wait for, the call ends behind them. */
function say(gateway: Gateway, call: Call, markup: string, base: string | null): void {
	const { said, gather } = readInstructions(markup);
	call.said.push(...said);
	call.digitsTo = gather ? addressOf(gather.action, base) : null;
	gateway.version += 1;
	if (call.digitsTo === null) {
		hangUp(gateway, call, 'completed');
	}
}

function addressOf(action: string | null, base: string | null): string | null {
	if (action === null) {
		return base;
	}
	return URL.canParse(action, base ?? undefined) ? new URL(action, base ?? undefined).toString() : null;
}

function setCallStatus(gateway: Gateway, call: Call, status: CallStatus): void {
	const now = Date.now();
	call.status = status;
	call.updatedAt = now;
	if (status === 'in-progress') {
		call.startedAt = now;
	}
	if (isOver(call)) {
		call.endedAt = now;
	}
	gateway.version += 1;
	if (call.statusCallback && call.callbackEvents.includes(EVENTS[status])) {
		void postWebhook(gateway.settings.authToken, call.statusCallback, callFields(gateway, call));
	}
}

function callFields({ settings }: Gateway, call: Call): Record<string, string> {
	return {
		AccountSid: settings.accountSid,
		ApiVersion: API_VERSION,
		CallSid: call.sid,
		CallStatus: call.status,
		Direction: 'outbound-api',
		From: settings.from,
		To: call.number,
		Timestamp: rfc2822(call.updatedAt)
	};
}
