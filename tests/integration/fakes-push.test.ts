import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import type { Agent } from 'node:https';
import webPush from 'web-push';
import { startFakes, type Fakes } from '../support/fakes';
import { receiveHooks, type HookReceiver } from '../support/hook-receiver';
import {
	agentOf,
	pushedDevice,
	pushFault,
	subscribe,
	takePermissionAway,
	type Subscription
} from '../support/push';

/** The stand-in for the push service, written to by the very library that the application uses. */

const keys = webPush.generateVAPIDKeys();
const OTHERS = webPush.generateVAPIDKeys();
const FOR_ANOTHER = webPush.getVapidHeaders(
	'https://push.example',
	'mailto:a@b.example',
	keys.publicKey,
	keys.privateKey,
	'aes128gcm'
);
let app: HookReceiver;
let fakes: Fakes;
let agent: Agent;
let phone: Subscription;

beforeAll(async () => {
	app = await receiveHooks();
	fakes = await startFakes(app.url);
	agent = await agentOf(fakes);
	phone = await subscribe(fakes, 'Rona Ferris', keys.publicKey);
});
afterAll(async () => {
	await fakes.stop();
	await app.close();
});
afterEach(() => pushFault(fakes, 'ok'));

function push(to: Subscription, more: Partial<webPush.RequestOptions> = {}, payload = '{"title":"HIGH"}') {
	const vapidDetails = { subject: 'mailto:ropewalk@saltmarsh.example', ...keys };
	return webPush.sendNotification(to, payload, { agent, vapidDetails, TTL: 60, ...more });
}

describe('a message', () => {
	it('is decrypted and shown, with how urgent it is', async () => {
		const sent = await push(
			phone,
			{ urgency: 'high', topic: 'call-1' },
			'{"title":"HIGH","body":"Ward, bed ő"}'
		);
		expect(sent.statusCode).toBe(201);
		expect((await pushedDevice(fakes, phone))?.notices).toEqual([
			expect.objectContaining({
				payload: { title: 'HIGH', body: 'Ward, bed ő' },
				urgency: 'high',
				topic: 'call-1',
				ttlSeconds: 60
			})
		]);
	});

	it('takes the place of an earlier one of its topic', async () => {
		const device = await subscribe(fakes, 'Somebody');
		await push(device, { topic: 'call-2' }, '{"n":1}');
		await push(device, { topic: 'call-2' }, '{"n":2}');
		await push(device, {}, '{"n":3}');
		const { notices } = (await pushedDevice(fakes, device)) ?? { notices: [] };
		expect(notices.map(({ payload }) => payload.n)).toEqual([2, 3]);
	});

	it.each<[string, number, Partial<webPush.RequestOptions>, string?]>([
		['another sender’s', 403, { vapidDetails: { subject: 'mailto:a@b.example', ...OTHERS } }],
		['not signed', 401, { vapidDetails: undefined }],
		['meant for another service', 401, { vapidDetails: undefined, headers: { ...FOR_ANOTHER } }],
		['over the limit', 413, {}, JSON.stringify({ body: 'x'.repeat(4_500) })]
	])('%s is refused with %i', async (_, statusCode, more, payload) => {
		await expect(push(phone, more, payload)).rejects.toMatchObject({ statusCode });
	});

	it('encrypted for another device is refused', async () => {
		const { endpoint } = phone;
		const other = await subscribe(fakes, 'Another');
		await expect(push({ ...other, endpoint })).rejects.toMatchObject({ statusCode: 400 });
	});

	it('without a certificate that is known is not even sent', async () => {
		await expect(push(phone, { agent: undefined })).rejects.toMatchObject({
			code: 'DEPTH_ZERO_SELF_SIGNED_CERT'
		});
	});

	it('without TLS is refused', async () => {
		const response = await fetch(phone.endpoint.replace('https', 'http'), { method: 'POST', body: 'x' });
		expect(response.status).toBe(400);
	});

	it('to a device that has taken its permission away is refused for good', async () => {
		const device = await subscribe(fakes, 'Leaving');
		await takePermissionAway(fakes, device);
		await expect(push(device)).rejects.toMatchObject({ statusCode: 410 });
	});
});

describe('faults', () => {
	it.each(['404', '410', '429', '500'])('%s', async (mode) => {
		await pushFault(fakes, mode, 1);
		await expect(push(phone)).rejects.toMatchObject({
			statusCode: Number(mode),
			headers: mode === '429' ? { 'retry-after': '1' } : {}
		});
		expect((await push(phone)).statusCode).toBe(201);
	});

	it('hang: no answer, and nothing is shown', async () => {
		const device = await subscribe(fakes, 'Waiting');
		await pushFault(fakes, 'hang', 1);
		await expect(push(device, { timeout: 100 })).rejects.toThrow('Socket timeout');
		expect((await pushedDevice(fakes, device))?.notices).toEqual([]);
	});

	it('accept-then-drop: no answer, and it is shown', async () => {
		const device = await subscribe(fakes, 'Cut off');
		await pushFault(fakes, 'accept-then-drop', 1);
		await expect(push(device)).rejects.toMatchObject({ code: 'ECONNRESET' });
		expect((await pushedDevice(fakes, device))?.notices).toHaveLength(1);
	});
});
