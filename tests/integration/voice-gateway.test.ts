import { eq } from 'drizzle-orm';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { escalations, outbox, smsStatuses, users } from '$lib/server/db/schema';
import { env } from '$lib/server/env';
import { takeEscalation } from '$lib/server/escalations/take';
import { untakeEscalation } from '$lib/server/escalations/undo';
import { openChannels } from '$lib/server/outbox/channels';
import type { Channel, Outgoing } from '$lib/server/outbox/channels/channel';
import { voiceChannel } from '$lib/server/outbox/channels/voice';
import { RingingTelephones } from '$lib/server/outbox/ringing';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { phoneOf, sendJson } from '../support/fakes';
import { contextOf, HOSPITAL_NOW, newPhone } from '../support/hospital';
import { addAlert, addEscalation, rowOf } from '../support/messages';
import { openGateway } from '../support/open-gateway';

/** Telephone calls through the real SDK against the stand-in, and back by its signed webhooks. */

const { gateway, hospital, hooks } = await openGateway();
const { voice } = openChannels(env());

afterEach(() => gateway.fault('sms', 'ok'));

const outgoing = (to: string): Outgoing => ({
	id: '01900000-0000-7000-8000-000000000000',
	to,
	name: null,
	subject: null,
	body: 'This is Ropewalk. Press 1.'
});

function open(channel: Channel | null | undefined): Channel {
	if (!channel) {
		throw new Error('Voice is not open.');
	}
	return channel;
}

/** The one call to a telephone, once it waits for a digit or is over. */
async function callTo(number: string, until: (status: string, said: string[]) => boolean) {
	for (;;) {
		const call = (await phoneOf(gateway, number))?.calls.at(-1);
		if (call && until(call.status, call.said)) {
			return call;
		}
	}
}

describe('the SDK against the stand-in', () => {
	it('rings, and says its words', async () => {
		const to = newPhone();
		expect((await open(voice).send(outgoing(to))).outcome).toMatchObject({ kind: 'accepted' });
		const call = await callTo(to, (_, said) => said.length > 0);
		expect(call.said[0]).toBe('This is Ropewalk. Press 1.');
	});

	it.each([
		['500', { kind: 'transient', reason: 'gateway-down', retryAfter: null }],
		['429', { kind: 'transient', reason: 'busy', retryAfter: 1_000 }],
		['refuse', { kind: 'unknown', reason: 'no-answer' }],
		['accept-then-drop', { kind: 'unknown', reason: 'no-answer' }]
	])('%s', async (mode, outcome) => {
		await gateway.fault('sms', mode, 1);
		expect((await open(voice).send(outgoing(newPhone()))).outcome).toEqual(outcome);
	});

	it('an answer after the limit is of unknown outcome', async () => {
		const { sms } = env();
		await gateway.fault('sms', 'slow', 1);
		const addresses = {
			digitUrl: `${hooks.url}/api/hooks/voice`,
			statusUrl: `${hooks.url}/api/hooks/voice-status`
		};
		const impatient = sms && voiceChannel(sms, addresses, 100);
		expect((await open(impatient).send(outgoing(newPhone()))).outcome).toMatchObject({ kind: 'unknown' });
	});
});

describe('a telephone that rings', () => {
	const { sms } = env();
	/** The stand-in picks up at once: of a telephone that nobody has picked up yet nothing further is told. */
	const silent = sms && voiceChannel(sms, { digitUrl: `${hooks.url}/none`, statusUrl: `${hooks.url}/none` });
	beforeEach(() => db().update(outbox).set({ state: 'skipped' }));

	/** A high call whose text was refused, so that the telephone of a nurse rings and is not picked up yet. */
	async function ringing(channel: Channel | null = silent) {
		const { nurse } = hospital.people;
		const phone = newPhone();
		await db().update(users).set({ phone }).where(eq(users.id, nurse.id));
		const id = await addEscalation(hospital);
		const { id: textId } = await addAlert(id, nurse.id);
		const text = { send: () => Promise.resolve(REFUSED), lookUp: null };
		const channels = { sms: text, mail: null, voice: channel };
		await new OutboxWorker({ channels, now: () => HOSPITAL_NOW }).settle();
		const [call] = await db()
			.select()
			.from(outbox)
			.where(eq(outbox.causeKey, `call:${textId}`));
		return { id, phone, message: call?.id ?? '', telephones: new RingingTelephones(channels) };
	}
	const REFUSED = { outcome: { kind: 'permanent', reason: 'bad-address' }, code: '21211' } as const;
	const statusAt = async (phone: string) => (await phoneOf(gateway, phone))?.calls.at(-1)?.status;

	it('is hung up when somebody else takes the call, and rings again when that is taken back', async () => {
		const { id, phone, message, telephones } = await ringing();
		expect(await telephones.hangUp(HOSPITAL_NOW)).toBe(0);
		await takeEscalation(contextOf(hospital.people.physician), id, null);
		expect(await telephones.hangUp(HOSPITAL_NOW + 1_000)).toBe(1);
		expect(await statusAt(phone)).toBe('completed');
		expect(await rowOf(message)).toMatchObject({ state: 'cancelled', stateReason: 'taken' });
		await untakeEscalation(contextOf(hospital.people.physician), id);
		expect((await rowOf(message)).state).toBe('ready');
	});

	it('is let be when who takes it is the one it rings for', async () => {
		const { id, telephones } = await ringing();
		await takeEscalation(contextOf(hospital.people.nurse), id, null);
		expect(await telephones.hangUp(HOSPITAL_NOW)).toBe(0);
	});

	it('and was picked up is let be', async () => {
		const { id, phone, telephones } = await ringing(open(voice));
		await callTo(phone, (_, said) => said.length > 0);
		const told = async () => (await db().select().from(smsStatuses)).map(({ status }) => status);
		await expect.poll(told).toContain('sent');
		await takeEscalation(contextOf(hospital.people.physician), id, null);
		expect(await telephones.hangUp(HOSPITAL_NOW)).toBe(0);
		expect(await statusAt(phone)).toBe('in-progress');
	});

	it('is tried again while the gateway is down', async () => {
		const { id, telephones } = await ringing();
		await takeEscalation(contextOf(hospital.people.physician), id, null);
		await gateway.fault('sms', '500');
		expect(await telephones.hangUp(HOSPITAL_NOW)).toBe(0);
		await gateway.fault('sms', 'ok');
		expect(await telephones.hangUp(HOSPITAL_NOW)).toBe(1);
	});
});

it('a text that does not arrive makes the telephone ring, and the digit takes the call for help', async () => {
	const { nurse } = hospital.people;
	const phone = newPhone();
	await db().update(users).set({ phone }).where(eq(users.id, nurse.id));
	const id = await addEscalation(hospital);
	const text = await addAlert(id, nurse.id);
	const worker = new OutboxWorker({ channels: openChannels(env()), now: () => HOSPITAL_NOW });
	await gateway.fault('sms', 'undelivered', 1);
	await worker.settle();
	await expect.poll(async () => (await rowOf(text.id)).state).toBe('undelivered');
	await worker.settle();
	const call = await callTo(phone, (_, said) => said.length > 0);
	const pressed = await sendJson('POST', `${gateway.smsUrl}/calls/${call.sid}/digits`, { digits: '1' });
	expect(pressed.body).toMatchObject({ status: 200 });
	const [escalation] = await db().select().from(escalations).where(eq(escalations.id, id));
	expect(escalation).toMatchObject({ state: 'taken', takenBy: nurse.id });
	const { said } = await callTo(phone, (status) => status === 'completed');
	expect(said.at(-1)).toMatch(/^It is yours\./);
	const answered = async () =>
		(await db().select().from(outbox).where(eq(outbox.providerId, call.sid)))[0]?.state;
	await expect.poll(answered).toBe('delivered');
});
