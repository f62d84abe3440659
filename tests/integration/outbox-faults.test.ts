import { eq } from 'drizzle-orm';
import { beforeEach, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { outbox, patients } from '$lib/server/db/schema';
import { env } from '$lib/server/env';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { troublesFor } from '$lib/server/messages/trouble';
import { openChannels } from '$lib/server/outbox/channels';
import type { Channel } from '$lib/server/outbox/channels/channel';
import { smsChannel } from '$lib/server/outbox/channels/sms';
import { MAX_IN_FLIGHT, OutboxWorker } from '$lib/server/outbox/worker';
import { ScriptedChannel } from '../support/channels';
import { sendJson } from '../support/fakes';
import { HOSPITAL_NOW } from '../support/hospital';
import { addAlert, addEscalation, addReminder, addVisit, attemptsOf, rowOf } from '../support/messages';
import { openGateway } from '../support/open-gateway';

/** Whole courses of a fault through the real client: a gateway that is away for an hour, and a number that said STOP. */

const { gateway, hospital } = await openGateway();
const MINUTE = 60_000;
let now: number;

beforeEach(async () => {
	await db().update(outbox).set({ state: 'cancelled' });
	now = HOSPITAL_NOW;
});

const reminder = async () => addReminder(await addVisit(hospital), hospital.patient.id);
const call = async () =>
	addAlert(await addEscalation(hospital), hospital.people.nurse.id, {
		notBefore: now,
		expiresAt: now + 60 * MINUTE
	});

/** The real channel of texts, at the stand-in or at an address where nobody listens, and the order in which it sends. */
function texts(baseUrl?: string): { channel: Channel; order: string[] } {
	const { sms } = env();
	const real = sms && smsChannel({ ...sms, ...(baseUrl && { baseUrl }) }, `${env().publicUrl}/none`, 2_000);
	if (!real) {
		throw new Error('The demonstration has a gateway.');
	}
	const order: string[] = [];
	return { order, channel: { ...real, send: (message) => (order.push(message.id), real.send(message)) } };
}

it('F10: away for an hour, the queue grows, a call goes by telephone, and it drains in order of urgency', async () => {
	const waiting: string[] = [];
	for (let count = 0; count < 8; count += 1) {
		waiting.push(await reminder());
	}
	const early = await call();
	const voice = new ScriptedChannel();
	const away = { sms: texts('http://127.0.0.1:1').channel, mail: null, voice };
	const worker = new OutboxWorker({ channels: away, now: () => now, random: () => 0.999 });
	for (let minute = 0; minute <= 60; minute += 1) {
		await worker.settle();
		now += MINUTE;
	}
	expect((await rowOf(early.id)).state).toBe('failed');
	expect(voice.sent).toHaveLength(1);
	const trouble = await troublesFor(db(), hospital.people.nurse, now);
	expect(trouble).toMatchObject([{ channel: 'sms', waiting: waiting.length }]);
	const { channel, order } = texts();
	// So much later that each reminder is due again: a call that comes up now finds all of them before it.
	now += 60 * MINUTE;
	const late = await call();
	const back = new OutboxWorker({ channels: { sms: channel, mail: null }, now: () => now, random: () => 0 });
	await back.settle();
	// Begun first; those that begin in the same round may reach the gateway a moment before it, the rest behind it.
	expect(order.indexOf(late.id)).toBeLessThanOrEqual(MAX_IN_FLIGHT.sms.routine);
	expect(order.toSorted()).toEqual([late.id, ...waiting].toSorted());
	for (const id of order) {
		expect((await rowOf(id)).state).toBe('accepted');
	}
});

it('F14: a number that said STOP to the gateway is noted, refused once, and somebody has to see to it', async () => {
	const { id: patientId, phone } = hospital.patient;
	await sendJson('POST', `${gateway.smsUrl}/phones/${encodeURIComponent(phone)}/reply`, { body: 'STOP' });
	// The gateway knows of it, and we have lost that it told us.
	await db().update(patients).set({ smsOptedOutAt: null }).where(eq(patients.id, patientId));
	const id = await reminder();
	const worker = new OutboxWorker({ channels: openChannels(env()), now: () => now, random: () => 0.5 });
	await worker.settle();
	now += 24 * 60 * MINUTE;
	await worker.settle();
	expect((await attemptsOf(id)).map(({ outcome, code }) => [outcome, code])).toEqual([
		['permanent', '21610']
	]);
	expect(await rowOf(id)).toMatchObject({ state: 'failed', stateReason: 'opted-out' });
	const [patient] = await db().select().from(patients).where(eq(patients.id, patientId));
	expect(patient?.smsOptedOutAt).toEqual(expect.any(Number));
	const { mine } = await looseEndsOf(db(), hospital.people.coordinator, HOSPITAL_NOW);
	expect(mine).toContainEqual(expect.objectContaining({ kind: 'message-failed', id }));
});
