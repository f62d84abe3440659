import { createECDH, randomBytes, type ECDH } from 'node:crypto';
import type { Fault } from '../common/faults';

export const PUSH_MODES = ['ok', '410', '404', '429', '500', 'hang', 'refuse', 'accept-then-drop'] as const;
export type PushMode = (typeof PUSH_MODES)[number];

/** What a device was shown. */
export interface Notice {
	id: string;
	at: number;
	/** What was sent, decrypted. */
	payload: Record<string, unknown>;
	urgency: string;
	topic: string | null;
	ttlSeconds: number;
}

/** A browser that has subscribed: its keys, of which only the public ones leave it, and what it was shown. */
export interface Device {
	id: string;
	owner: string;
	keys: ECDH;
	auth: Buffer;
	/** The key of the one sender that may write to it; null where any may. */
	sender: string | null;
	notices: Notice[];
	/** Its owner has taken the permission away: nothing reaches it any more. */
	gone: boolean;
}

export interface PushService {
	fault: Fault<PushMode>;
	devices: Map<string, Device>;
	/** Grows with every change, so that a page can ask whether there is anything new. */
	version: number;
	/** Differs after a restart, when `version` begins again. */
	boot: string;
}

/** A push service without devices. Everything is kept in memory and is gone with the process. */
export function createPushService(): PushService {
	return {
		fault: { mode: 'ok', left: null },
		devices: new Map(),
		version: 0,
		boot: randomBytes(6).toString('hex')
	};
}

/** A browser subscribes. */
export function addDevice(service: PushService, owner: string, sender: string | null): Device {
	const keys = createECDH('prime256v1');
	keys.generateKeys();
	const id = randomBytes(16).toString('hex');
	const device = { id, owner, keys, auth: randomBytes(16), sender, notices: [], gone: false };
	service.devices.set(id, device);
	service.version += 1;
	return device;
}
