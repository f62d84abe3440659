import { beforeEach, describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { outbox } from '$lib/server/db/schema';
import { MAX_IN_FLIGHT, OutboxWorker } from '$lib/server/outbox/worker';
import { ScriptedChannel, transient } from '../support/channels';
import { HOSPITAL_NOW } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { addAlert, addEscalation, addReminder, addVisit, rowOf } from '../support/messages';

/** A gateway that hangs holds up nobody else, and routine never holds up a call for help: fault F11. */

const HOUR = 60 * 60 * 1000;

const hospital = await openHospital({ PORT: '4113' });
let sms: ScriptedChannel;
let mail: ScriptedChannel;

beforeEach(async () => {
	await db().update(outbox).set({ state: 'cancelled', leaseOwner: null, leaseUntil: null });
	sms = new ScriptedChannel();
	mail = new ScriptedChannel();
});

const worker = () =>
	new OutboxWorker({ channels: { sms, mail }, now: () => HOSPITAL_NOW, random: () => 0.5 });
const times = <T>(count: number, make: () => Promise<T>) => Promise.all(Array.from({ length: count }, make));

async function reminder(change: Parameters<typeof addReminder>[2] = {}) {
	return addReminder(await addVisit(hospital), hospital.patient.id, change);
}
const mailTo = () =>
	reminder({
		kind: 'mail',
		channel: 'mail',
		patientId: undefined,
		userId: hospital.people.surgeon.id,
		subject: 'Something to read',
		notBefore: HOSPITAL_NOW - HOUR
	});
const alert = async () => (await addAlert(await addEscalation(hospital), hospital.people.nurse.id)).id;

async function until(reached: () => boolean | Promise<boolean>): Promise<void> {
	while (!(await reached())) {
		await new Promise((resolve) => setImmediate(resolve));
	}
}
const sentIds = (channel: ScriptedChannel) => channel.sent.map(({ id }) => id);

describe('a limit for each channel', () => {
	it('mail that hangs leaves reminders and calls for help their places', async () => {
		mail.hold();
		const mails = await times(MAX_IN_FLIGHT.mail.routine + 4, mailTo);
		const sending = worker();
		const settled = sending.settle();
		await until(() => mail.sent.length === MAX_IN_FLIGHT.mail.routine);
		const later = [await reminder(), await alert()];
		sending.start();
		await until(async () => (await Promise.all(later.map(rowOf))).every(({ state }) => state === 'accepted'));
		expect(sentIds(sms).toSorted()).toEqual(later.toSorted());
		expect(mail.inFlight).toBe(MAX_IN_FLIGHT.mail.routine);
		mail.release();
		await settled;
		await sending.stop();
		expect(sentIds(mail).toSorted()).toEqual(mails.toSorted());
	});

	it('texts that hang leave mails theirs', async () => {
		sms.hold();
		await times(MAX_IN_FLIGHT.sms.all + 4, reminder);
		const id = await mailTo();
		const settled = worker().settle();
		await until(async () => (await rowOf(id)).state === 'accepted');
		expect(sms.inFlight).toBe(MAX_IN_FLIGHT.sms.routine);
		sms.release();
		await settled;
	});
});

describe('places that are kept for calls for help', () => {
	it('routine texts that hang do not hold up a call', async () => {
		sms.hold();
		const reminders = await times(MAX_IN_FLIGHT.sms.all + 4, () => reminder());
		const sending = worker();
		const settled = sending.settle();
		await until(() => sms.sent.length === MAX_IN_FLIGHT.sms.routine);
		const call = await alert();
		sending.start();
		await until(() => sentIds(sms).includes(call));
		expect(sms.mostInFlight).toBe(MAX_IN_FLIGHT.sms.routine + 1);
		sms.release();
		await settled;
		await sending.stop();
		expect(sentIds(sms).toSorted()).toEqual([...reminders, call].toSorted());
	});

	it('calls may fill the whole channel and no more', async () => {
		sms.hold();
		const calls = await (async () => {
			const escalation = await addEscalation(hospital);
			return times(
				MAX_IN_FLIGHT.sms.all + 3,
				async () => (await addAlert(escalation, hospital.people.nurse.id)).id
			);
		})();
		const late = await reminder({ notBefore: HOSPITAL_NOW - HOUR });
		const settled = worker().settle();
		await until(() => sms.sent.length === MAX_IN_FLIGHT.sms.all);
		expect(sentIds(sms)).not.toContain(late);
		sms.release();
		await settled;
		expect(sms.mostInFlight).toBe(MAX_IN_FLIGHT.sms.all);
		expect(sentIds(sms).toSorted()).toEqual([...calls, late].toSorted());
	});

	it('a call goes before what was due earlier', async () => {
		const early = await times(8, () => reminder({ notBefore: HOSPITAL_NOW - HOUR }));
		const call = await alert();
		await worker().settle();
		expect(sentIds(sms).slice(0, MAX_IN_FLIGHT.sms.routine)).toContain(call);
		expect(sentIds(sms).toSorted()).toEqual([...early, call].toSorted());
	});
});

describe('a gateway that asks for time', () => {
	const MINUTE = 60_000;
	let now: number;
	const paced = () => new OutboxWorker({ channels: { sms, mail }, now: () => now, random: () => 0.5 });
	beforeEach(() => {
		now = HOSPITAL_NOW;
	});

	it('gets it from reminders, and a call goes out meanwhile', async () => {
		sms.script = [transient(MINUTE)];
		const sending = paced();
		const refused = await reminder();
		await sending.settle();
		const [call, later] = [await alert(), await reminder()];
		await sending.settle();
		expect(sentIds(sms)).toEqual([refused, call]);
		now = HOSPITAL_NOW + MINUTE - 1;
		await sending.settle();
		expect(sentIds(sms)).toEqual([refused, call]);
		now += 1;
		await sending.settle();
		expect(sentIds(sms)).toContain(later);
	});

	it('gets it from the call that it refused, not from the next one', async () => {
		sms.script = [transient(30_000)];
		const sending = paced();
		const escalation = await addEscalation(hospital);
		const toNurse = async () => (await addAlert(escalation, hospital.people.nurse.id)).id;
		const refused = await toNurse();
		await sending.settle();
		const [next, later] = [await toNurse(), await reminder()];
		await sending.settle();
		expect(sentIds(sms)).toEqual([refused, next]);
		now = HOSPITAL_NOW + 30_000;
		await sending.settle();
		expect(sentIds(sms).toSorted()).toEqual([refused, refused, next, later].toSorted());
	});
});
