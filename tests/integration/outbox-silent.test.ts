import { afterAll, beforeEach, describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { outbox, smsStatuses } from '$lib/server/db/schema';
import { env } from '$lib/server/env';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { smsChannel } from '$lib/server/outbox/channels/sms';
import { SILENT_AFTER_MS, SilentMessages } from '$lib/server/outbox/silent';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { ScriptedChannel } from '../support/channels';
import { startGateway } from '../support/gateway';
import { HOSPITAL_NOW } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { addReminder, addVisit, rowOf } from '../support/messages';

/** A text that the gateway accepted and told nothing of afterwards: fault F15. */

const MINUTE = 60 * 1000;

// Nobody listens at the public address, so that every callback is lost.
const gateway = await startGateway('http://127.0.0.1:4119');
const hospital = await openHospital(gateway.env);
let now: number;

afterAll(() => gateway.stop());
beforeEach(async () => {
	await db().update(outbox).set({ state: 'cancelled' });
	await gateway.fault('sms', 'ok');
	now = HOSPITAL_NOW;
});

const reminder = async () => addReminder(await addVisit(hospital), hospital.patient.id);

function real() {
	const { sms, publicUrl } = env();
	if (!sms) {
		throw new Error('The demonstration has a gateway.');
	}
	return smsChannel(sms, `${publicUrl}/api/hooks/sms-status`, 2_000);
}

/** Sent through the real client, and at its end with the stand-in. */
async function sent(channel: ReturnType<typeof real>, end: string): Promise<string> {
	const id = await reminder();
	await new OutboxWorker({ channels: { sms: channel, mail: null }, now: () => now }).settle();
	const { providerId } = await rowOf(id);
	while ((await channel.statusOf?.(providerId ?? ''))?.status !== end) {
		await new Promise((resolve) => setImmediate(resolve));
	}
	return id;
}

describe('asked through the real client', () => {
	it('a text that was not delivered becomes a loose end', async () => {
		await gateway.fault('sms', 'undelivered', 1);
		const channel = real();
		const id = await sent(channel, 'undelivered');
		const silent = new SilentMessages({ sms: channel, mail: null });
		expect(await silent.ask(now + SILENT_AFTER_MS - 1)).toBe(0);
		expect((await rowOf(id)).state).toBe('accepted');
		expect(await new SilentMessages({ sms: channel, mail: null }).ask(now + SILENT_AFTER_MS)).toBe(1);
		expect(await rowOf(id)).toMatchObject({
			state: 'undelivered',
			stateReason: 'undelivered, gateway code 30003'
		});
		const { mine } = await looseEndsOf(db(), hospital.people.coordinator, now);
		expect(mine).toContainEqual(expect.objectContaining({ kind: 'message-failed', id }));
	});

	it('one that was delivered is delivered', async () => {
		const channel = real();
		const id = await sent(channel, 'delivered');
		await new SilentMessages({ sms: channel, mail: null }).ask(now + SILENT_AFTER_MS);
		expect((await rowOf(id)).state).toBe('delivered');
	});

	it('a gateway that gives no answer changes nothing', async () => {
		const channel = real();
		const id = await sent(channel, 'delivered');
		await gateway.fault('sms', 'refuse');
		await new SilentMessages({ sms: channel, mail: null }).ask(now + SILENT_AFTER_MS);
		expect((await rowOf(id)).state).toBe('accepted');
	});
});

describe('how often', () => {
	it('each is asked about every ten minutes, for two hours, and never after it is known', async () => {
		const asked: number[] = [];
		const sms = new ScriptedChannel();
		const answers = { status: 'sent' };
		const channel = Object.assign(sms, {
			statusOf: () => {
				asked.push((now - HOSPITAL_NOW) / MINUTE);
				return Promise.resolve({ ...answers, errorCode: null });
			}
		});
		await reminder();
		await new OutboxWorker({ channels: { sms: channel, mail: null }, now: () => now }).settle();
		const silent = new SilentMessages({ sms: channel, mail: null });
		for (; now < HOSPITAL_NOW + 150 * MINUTE; now += MINUTE / 2) {
			await silent.ask(now);
		}
		expect(asked).toEqual([10, 20, 30, 40, 50, 60, 70, 80, 90, 100, 110]);
	});

	it('a word that nobody knows is not kept', async () => {
		const sms = new ScriptedChannel();
		const channel = Object.assign(sms, {
			statusOf: () => Promise.resolve({ status: 'teleported', errorCode: null })
		});
		const id = await reminder();
		await new OutboxWorker({ channels: { sms: channel, mail: null }, now: () => now }).settle();
		const before = await db().$count(smsStatuses);
		await new SilentMessages({ sms: channel, mail: null }).ask(now + SILENT_AFTER_MS);
		expect(await db().$count(smsStatuses)).toBe(before);
		expect((await rowOf(id)).state).toBe('accepted');
	});
});
