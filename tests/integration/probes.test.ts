import { afterEach, beforeEach, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { liveEvents } from '$lib/server/db/schema';
import { env } from '$lib/server/env';
import { troublesFor } from '$lib/server/messages/trouble';
import { openChannels } from '$lib/server/outbox/channels';
import { mailChannel } from '$lib/server/outbox/channels/mail';
import { smsChannel } from '$lib/server/outbox/channels/sms';
import { forgetProbes, PROBE_EVERY_MS, Probes } from '$lib/server/outbox/probes';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { HOSPITAL_NOW } from '../support/hospital';
import { addAlert, addEscalation } from '../support/messages';
import { openGateway } from '../support/open-gateway';

/** A gateway that is down while nothing is sent: the real clients ask, and every page says so within a minute. */

const { gateway, hospital } = await openGateway();
const MINUTE = 60_000;
let start = HOSPITAL_NOW;
let now: number;

beforeEach(() => {
	start += 25 * 60 * MINUTE;
	now = start;
});
afterEach(async () => {
	forgetProbes();
	await gateway.fault('sms', 'ok');
});

/** As the worker's beat does, once a second. */
async function pass(probes: Probes, ms: number): Promise<void> {
	for (const end = now + ms; now < end; now += 1_000) {
		await probes.run(now);
	}
}

const admins = () => troublesFor(db(), hospital.people.admin, now);
const nurses = () => troublesFor(db(), hospital.people.nurse, now);

it('an SMS gateway that goes is on every page within a minute, and off when it is back', async () => {
	const probes = new Probes(openChannels(env()));
	await pass(probes, MINUTE);
	expect(await nurses()).toEqual([]);
	await gateway.fault('sms', '500');
	const gone = now;
	await pass(probes, MINUTE);
	const since = expect.any(String) as string;
	expect(await nurses()).toEqual([{ channel: 'sms', since, waiting: 0 }]);
	expect(Date.parse((await nurses())[0]?.since ?? '') - gone).toBeLessThanOrEqual(PROBE_EVERY_MS);
	await gateway.fault('sms', 'ok');
	await pass(probes, MINUTE);
	expect(await nurses()).toEqual([]);
	const told = (await db().select().from(liveEvents)).filter(({ topic }) => topic === 'delivery');
	expect(told.map(({ kind }) => kind)).toEqual(['fails', 'works']);
});

it('one answer that does not come alarms nobody', async () => {
	const probes = new Probes(openChannels(env()));
	await gateway.fault('sms', '500');
	await probes.run(now);
	await gateway.fault('sms', 'ok');
	now += PROBE_EVERY_MS;
	await probes.run(now);
	await gateway.fault('sms', '500');
	now += PROBE_EVERY_MS;
	await probes.run(now);
	expect(await nurses()).toEqual([]);
});

it.each([
	['nobody listens', { baseUrl: 'http://127.0.0.1:1' }],
	['our token is not known', { authToken: 'another' }]
])('%s: down', async (_, change) => {
	const { sms } = env();
	const probes = new Probes({
		sms: sms && smsChannel({ ...sms, ...change }, 'http://a.example/'),
		mail: null
	});
	await pass(probes, MINUTE);
	expect(await nurses()).toMatchObject([{ channel: 'sms' }]);
});

it('one that asks for time is there', async () => {
	await gateway.fault('sms', '429');
	await pass(new Probes(openChannels(env())), MINUTE);
	expect(await nurses()).toEqual([]);
});

it('a mail server that is not there is told to those who can do something about it', async () => {
	const { mail, publicUrl } = env();
	const away = mail && mailChannel({ ...mail, url: 'smtp://127.0.0.1:1' }, publicUrl);
	await pass(new Probes({ sms: null, mail: away }), MINUTE);
	expect(await admins()).toMatchObject([{ channel: 'mail' }]);
	expect(await nurses()).toEqual([]);
	await pass(new Probes({ sms: null, mail: mail && mailChannel(mail, publicUrl) }), MINUTE);
	expect(await admins()).toEqual([]);
});

it('what failed for good before is no trouble any more once the gateway was seen to come back', async () => {
	const probes = new Probes(openChannels(env()));
	await gateway.fault('sms', '500');
	const { nurse } = hospital.people;
	await addAlert(await addEscalation(hospital), nurse.id, { notBefore: now, expiresAt: now + 60 * MINUTE });
	const worker = new OutboxWorker({ channels: openChannels(env()), now: () => now, random: () => 0.5 });
	for (const wait of [0, 5, 15, 45]) {
		now += wait * 1_000;
		await worker.settle();
		await probes.run(now);
	}
	expect(await nurses()).toMatchObject([{ channel: 'sms' }]);
	await gateway.fault('sms', 'ok');
	await pass(probes, MINUTE);
	expect(await nurses()).toEqual([]);
});

it('without a gateway nothing is asked, and nothing is said of it', async () => {
	await pass(new Probes({ sms: null, mail: null }), 2 * MINUTE);
	expect(await admins()).toEqual([]);
});
