import { Agent } from 'node:https';
import { itemsOf, sendJson, type Fakes } from './fakes';

/** What a browser hands to a page, as JSON. */
export interface Subscription {
	endpoint: string;
	keys: { p256dh: string; auth: string };
}

/** A device as the stand-in for the push service shows it. */
export interface PushedDevice {
	id: string;
	owner: string;
	gone: boolean;
	notices: {
		payload: Record<string, unknown>;
		urgency: string;
		topic: string | null;
		ttlSeconds: number;
	}[];
}

type Where = Pick<Fakes, 'smsUrl'>;

/** A browser of the stand-in's subscribes; `sender` is the key of who may write to it. */
export async function subscribe({ smsUrl }: Where, owner: string, sender?: string): Promise<Subscription> {
	const { body } = await sendJson('POST', `${smsUrl}/push/devices`, { owner, applicationServerKey: sender });
	return body as unknown as Subscription;
}

/** The device that a subscription is of; undefined where the stand-in does not know it. */
export async function pushedDevice({ smsUrl }: Where, { endpoint }: Subscription) {
	const devices = await itemsOf<PushedDevice>(`${smsUrl}/push/devices`);
	return devices.find(({ id }) => endpoint.endsWith(`/${id}`));
}

/** Its owner takes the permission away in the settings of the browser. */
export async function takePermissionAway({ smsUrl }: Where, { endpoint }: Subscription): Promise<void> {
	await fetch(`${smsUrl}/push/devices/${endpoint.split('/').at(-1)}`, { method: 'DELETE' });
}

export async function pushFault({ smsUrl }: Where, mode: string, count?: number): Promise<void> {
	const { status } = await sendJson('PUT', `${smsUrl}/push/faults`, { mode, count });
	if (status !== 200) {
		throw new Error(`The fault ${mode} was refused.`);
	}
}

/** An agent that trusts the stand-in's own certificate. */
export async function agentOf({ smsUrl }: Where): Promise<Agent> {
	return new Agent({ ca: await (await fetch(`${smsUrl}/push/certificate`)).text() });
}
