import twilio from 'twilio';
import type { RequestOptions } from 'twilio/lib/base/RequestClient.js';
import { end, spawnFake } from '../../src/cli/lib/children.mjs';
import { freePorts } from '../../src/cli/lib/ports.mjs';
import { waitUntilReady } from '../../src/cli/lib/ready.mjs';
import { settingsOf } from '../../src/cli/lib/settings.mjs';
import { TOKEN } from './hook-receiver';

export const ACCOUNT = `AC${'0'.repeat(32)}`;
export const FROM = '+353860000000';

/** Both fakes as processes on free ports, without the application. */
export interface Fakes {
	smsUrl: string;
	mailUrl: string;
	smtpPort: number;
	stop(): Promise<void>;
}

/** Starts both fakes; webhooks go to `publicUrl`. The mode `slow` answers after `slowMs`. */
export async function startFakes(publicUrl: string, slowMs = 10_000): Promise<Fakes> {
	const [smsPort, mailPort, smtpPort = 0] = await freePorts(3);
	const given = {
		...process.env,
		PUBLIC_URL: publicUrl,
		FAKE_SLOW_MS: String(slowMs),
		FAKE_SMS_PORT: String(smsPort),
		FAKE_MAIL_PORT: String(mailPort),
		FAKE_SMTP_PORT: String(smtpPort)
	};
	const { env } = settingsOf(given, { demo: true });
	const smsUrl = `http://127.0.0.1:${smsPort}`;
	const mailUrl = `http://127.0.0.1:${mailPort}`;
	const sms = spawnFake('sms', env);
	const mail = spawnFake('mail', env);
	const why = await Promise.all([
		waitUntilReady(`${smsUrl}/healthz`, sms, 20_000),
		waitUntilReady(`${mailUrl}/healthz`, mail, 20_000)
	]);
	const stop = async () => void (await Promise.all([end(sms), end(mail)]));
	if (why.some((reason) => reason !== null)) {
		await stop();
		throw new Error(`The fakes did not start: ${why.join(', ')}`);
	}
	return { smsUrl, mailUrl, smtpPort, stop };
}

/** The SDK's own client, with the gateway's address replaced by the fake's. */
class ClientOfFake extends twilio.RequestClient {
	constructor(
		private readonly base: string,
		timeout: number
	) {
		super({ timeout, autoRetry: false });
	}

	override request<TData>(options: RequestOptions<TData>) {
		const uri = options.uri.replace('https://api.twilio.com', this.base);
		return super.request({ ...options, uri });
	}
}

/** The real SDK, signed in to the fake; a request may take `timeout` milliseconds. */
export function gatewayClient(smsUrl: string, token = TOKEN, timeout = 5_000) {
	return twilio(ACCOUNT, token, { httpClient: new ClientOfFake(smsUrl, timeout), autoRetry: false });
}

/** Sends JSON to one of the fakes. */
export async function sendJson(method: string, url: string, body: unknown) {
	const headers = { 'Content-Type': 'application/json' };
	const response = await fetch(url, { method, headers, body: JSON.stringify(body) });
	return { status: response.status, body: (await response.json()) as Record<string, unknown> };
}

/** The items of one of the fakes' lists. */
export async function itemsOf<Item>(url: string): Promise<Item[]> {
	const { items } = (await (await fetch(url)).json()) as { items: Item[] };
	return items;
}

/** A phone as the SMS fake shows it. */
export interface Phone {
	number: string;
	owner: string | null;
	messages: { sid: string; at: string; direction: 'in' | 'out'; body: string; status: string }[];
	calls: { sid: string; said: string[]; pressed: string; status: string }[];
}

/** The phone of this number, undefined when the SMS fake does not know it. */
export async function phoneOf({ smsUrl }: Pick<Fakes, 'smsUrl'>, number: string): Promise<Phone | undefined> {
	return (await itemsOf<Phone>(`${smsUrl}/phones`)).find((phone) => phone.number === number);
}
