/** Devices that show notices: what they are called, and which addresses may be written to. */

/** What a person calls it. What exactly it is, the product does not keep. */
export const DEVICE_KINDS = ['phone', 'tablet', 'computer'] as const;
export type DeviceKind = (typeof DEVICE_KINDS)[number];

/** So many a person has at most: each call for help goes to all of them. */
export const DEVICES_MAX = 10;

/** One of a person's devices as they see it; instants in milliseconds UTC. */
export interface DeviceLine {
	id: string;
	kind: DeviceKind;
	createdAt: number;
	lastSuccessAt: number | null;
	lastFailureAt: number | null;
	/** It is the one that they are looking at. */
	here: boolean;
}

/** What kind of device a browser says it runs on. */
export function deviceKind(userAgent: string | null): DeviceKind {
	const agent = userAgent ?? '';
	if (/iPad|Tablet/i.test(agent) || (/Android/i.test(agent) && !/Mobi/i.test(agent))) {
		return 'tablet';
	}
	return /Mobi|iPhone/i.test(agent) ? 'phone' : 'computer';
}

/**
 * May messages be sent there? Addresses come from browsers, so only those of push services that the hospital knows
 * count: a whole host, with its port where it has one, over TLS, and no name or password in front of it.
 */
export function isAllowedEndpoint(endpoint: string, hosts: readonly string[]): boolean {
	if (!URL.canParse(endpoint)) {
		return false;
	}
	const { protocol, host, username, password } = new URL(endpoint);
	return protocol === 'https:' && username === '' && password === '' && hosts.includes(host);
}
