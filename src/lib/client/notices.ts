/** Turning the notices of this browser on and off. */
import { newKey, postJson } from './api';

/** Why notices cannot be turned on here: `none` when they can. */
export type Obstacle = 'none' | 'no-support' | 'blocked';

const WORKER = '/service-worker.js';

/** What stands in the way in this browser, without asking for anything. */
export function obstacle(): Obstacle {
	const known = 'serviceWorker' in navigator && 'PushManager' in window && 'Notification' in window;
	if (!known) {
		return 'no-support';
	}
	return Notification.permission === 'denied' ? 'blocked' : 'none';
}

/**
 * Ask for the permission, subscribe at the browser's push service, and tell the server where that is.
 * @param publicKey the server's, in base64url: only its messages are taken
 * @returns what stood in the way; `no-service` when the browser cannot reach its push service
 * @throws ApiProblem when the server refuses it
 */
export async function turnOn(publicKey: string): Promise<Obstacle | 'no-service'> {
	if ((await Notification.requestPermission()) !== 'granted') {
		return 'blocked';
	}
	const subscription = await subscribed(publicKey);
	if (subscription === null) {
		return 'no-service';
	}
	const { endpoint, keys } = subscription.toJSON();
	await postJson('/api/devices', { endpoint, keys }, newKey());
	return 'none';
}

async function subscribed(publicKey: string): Promise<PushSubscription | null> {
	try {
		await navigator.serviceWorker.register(WORKER);
		const { pushManager } = await navigator.serviceWorker.ready;
		return await pushManager.subscribe({ userVisibleOnly: true, applicationServerKey: publicKey });
	} catch {
		return null;
	}
}

/** Give the subscription back, after the server has forgotten it. One that is not given back shows nothing any more. */
export async function turnedOff(): Promise<void> {
	const registration = await navigator.serviceWorker?.getRegistration();
	await (await registration?.pushManager.getSubscription())?.unsubscribe();
}
