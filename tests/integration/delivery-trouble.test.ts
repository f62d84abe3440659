import { eq } from 'drizzle-orm';
import { afterAll, beforeEach, describe, expect, it } from 'vitest';
import { ROLES } from '$lib/domain/core/codes';
import { db } from '$lib/server/db';
import { liveEvents, outbox, outboxAttempts } from '$lib/server/db/schema';
import { env } from '$lib/server/env';
import { mayHear } from '$lib/server/live/stream';
import { troublesFor } from '$lib/server/messages/trouble';
import type { Channels } from '$lib/server/outbox/channels/channel';
import { smsChannel } from '$lib/server/outbox/channels/sms';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { ScriptedChannel, permanent, transient, unknown } from '../support/channels';
import { startGateway } from '../support/gateway';
import { HOSPITAL_NOW } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { addAlert, addEscalation, addReminder, addVisit, rowOf } from '../support/messages';

/** That a gateway is down is seen on every page, with since when and how many wait: fault F10. */

const SECOND = 1_000;
const MINUTE = 60 * SECOND;
const HOUR = 60 * MINUTE;

const gateway = await startGateway('http://127.0.0.1:4114');
const hospital = await openHospital(gateway.env);
let sms: ScriptedChannel;
let mail: ScriptedChannel;
/** Each test is a day after the one before, so that no success of another counts. */
let start = HOSPITAL_NOW;
let now: number;

afterAll(() => gateway.stop());

beforeEach(async () => {
	await db().update(outbox).set({ state: 'cancelled', stateReason: null });
	start += 25 * HOUR;
	now = start;
	sms = new ScriptedChannel();
	mail = new ScriptedChannel();
});

const worker = (channels: Partial<Channels> = {}) =>
	new OutboxWorker({
		channels: { sms, mail, voice: new ScriptedChannel(), ...channels },
		now: () => now,
		random: () => 0.999
	});
const life = () => ({ notBefore: now, expiresAt: now + 24 * HOUR });
const visit = () => addVisit(hospital, { startsAt: now + 48 * HOUR });
const reminder = async () => addReminder(await visit(), hospital.patient.id, life());
const mailTo = async () =>
	addReminder(await visit(), hospital.patient.id, {
		...life(),
		kind: 'mail',
		channel: 'mail',
		patientId: undefined,
		userId: hospital.people.surgeon.id,
		subject: 'Something to read'
	});
const call = async () => {
	const link = { createdAt: now, expiresAt: now + 12 * HOUR };
	return (await addAlert(await addEscalation(hospital), hospital.people.nurse.id, life(), link)).id;
};
const seenBy = (role: (typeof ROLES)[number]) => troublesFor(db(), hospital.people[role], now);
const at = (instant: number) => new Date(instant).toISOString();

async function told(): Promise<string[]> {
	const rows = await db().select().from(liveEvents).where(eq(liveEvents.topic, 'delivery'));
	return rows.filter((row) => row.at >= start).map(({ kind, subjectId }) => `${subjectId} ${kind}`);
}

describe('text messages', () => {
	it('in no trouble when they go out', async () => {
		await reminder();
		await worker().settle();
		expect(await seenBy('nurse')).toEqual([]);
	});

	it.each([
		['refused', transient],
		['of unknown fate', unknown]
	])('%s: seen by everybody from the first failure on, with how many wait', async (_, fate) => {
		await Promise.all([reminder(), reminder(), call()]);
		sms.script = [fate(), fate(), fate()];
		await worker().settle();
		for (const role of ROLES) {
			expect(await seenBy(role)).toEqual([{ channel: 'sms', since: at(start), waiting: 3 }]);
		}
	});

	it('that fail on and on are in trouble since the first failure, until one goes through', async () => {
		const id = await call();
		const sending = worker();
		for (let attempt = 0; attempt < 3; attempt += 1) {
			sms.script = [transient()];
			await sending.settle();
			now = (await rowOf(id)).nextAt;
			expect(await seenBy('nurse')).toEqual([{ channel: 'sms', since: at(start), waiting: 1 }]);
		}
		await sending.settle();
		expect((await rowOf(id)).state).toBe('accepted');
		expect(await seenBy('nurse')).toEqual([]);
		expect(await told()).toEqual(['sms fails', 'sms fails', 'sms fails', 'sms works']);
	});

	it('that were given up do not end the trouble; an hour without an attempt does', async () => {
		const id = await call();
		const sending = worker();
		while ((await rowOf(id)).state !== 'failed') {
			sms.script = [transient()];
			now = (await rowOf(id)).nextAt;
			await sending.settle();
		}
		const last = (await rowOf(id)).nextAt;
		expect(await seenBy('nurse')).toEqual([{ channel: 'sms', since: at(start), waiting: 0 }]);
		now = last + HOUR - 1;
		expect(await seenBy('nurse')).toHaveLength(1);
		now = last + HOUR;
		expect(await seenBy('nurse')).toEqual([]);
	});

	it('of which another got through since are in no trouble, though one still waits', async () => {
		await reminder();
		sms.script = [transient()];
		const sending = worker();
		await sending.settle();
		now += 10 * SECOND;
		await call();
		await sending.settle();
		expect(await seenBy('nurse')).toEqual([]);
	});

	it('refused for good say nothing of the gateway', async () => {
		await reminder();
		sms.script = [permanent('bad-address')];
		await worker().settle();
		expect(await seenBy('nurse')).toEqual([]);
	});

	it('held without a gateway are in trouble', async () => {
		await reminder();
		await worker({ sms: null }).settle();
		expect(await seenBy('nurse')).toEqual([{ channel: 'sms', since: at(start), waiting: 1 }]);
	});
});

describe('telephone calls', () => {
	it('that cannot be made while texts go out are a trouble of their own', async () => {
		const started = now;
		sms.script = [unknown()];
		await call();
		await worker({ voice: null }).settle();
		now += SECOND;
		await reminder();
		await worker({ voice: null }).settle();
		expect(await seenBy('nurse')).toEqual([{ channel: 'voice', since: at(started), waiting: 1 }]);
	});
});

describe('mails', () => {
	it('in trouble are told to those who can do something about it', async () => {
		await mailTo();
		mail.script = [transient()];
		await worker().settle();
		for (const role of ROLES) {
			const seen = (await seenBy(role)).map(({ channel }) => channel);
			expect([role, seen]).toEqual([role, role === 'coordinator' || role === 'admin' ? ['mail'] : []]);
		}
	});

	it('asked to come later by one server say nothing of ours', async () => {
		await mailTo();
		mail.script = [{ outcome: { kind: 'transient', reason: 'try-later', retryAfter: null }, code: '451' }];
		await worker().settle();
		expect(await seenBy('coordinator')).toEqual([]);
	});
});

it('the event is heard by everybody, units or not', () => {
	const event = {
		topic: 'delivery',
		kind: 'fails',
		id: 'sms',
		episodeId: null,
		unitId: null,
		cursor: 1
	} as const;
	for (const role of ROLES) {
		expect(mayHear({ ...hospital.people[role], unitIds: [] }, event)).toBe(true);
	}
});

it('a gateway that refuses connections is seen after the first attempt of the real client', async () => {
	const { sms: account, publicUrl } = env();
	if (!account) {
		throw new Error('The demonstration has a gateway.');
	}
	await gateway.fault('sms', 'refuse');
	const id = await call();
	const sending = worker({ sms: smsChannel(account, `${publicUrl}/api/hooks/sms-status`, 400) });
	await sending.settle();
	expect(await seenBy('nurse')).toEqual([{ channel: 'sms', since: at(start), waiting: 1 }]);
	await gateway.fault('sms', 'ok');
	now = (await rowOf(id)).nextAt;
	await sending.settle();
	expect(await seenBy('nurse')).toEqual([]);
	expect(await db().$count(outboxAttempts, eq(outboxAttempts.messageId, id))).toBe(2);
});
