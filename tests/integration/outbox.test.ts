import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import {
	audit,
	episodes,
	escalations,
	liveEvents,
	outbox,
	patients,
	users,
	visits
} from '$lib/server/db/schema';
import { wakeWorkers } from '$lib/server/effects';
import { linkToken } from '$lib/server/links';
import type { Channels } from '$lib/server/outbox/channels/channel';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { ScriptedChannel, accepted, permanent, transient, unknown } from '../support/channels';
import { HOSPITAL_NOW, addPatient, addPerson, newPhone } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { addAlert, addEscalation, addReminder, addVisit, attemptsOf, rowOf } from '../support/messages';

const SECOND = 1_000;
const MINUTE = 60 * SECOND;
const HOUR = 60 * MINUTE;
const DAY = 24 * HOUR;

const hospital = await openHospital({ PORT: '4300' });
let sms: ScriptedChannel;
let mail: ScriptedChannel;
let now: number;

beforeEach(async () => {
	await db().update(outbox).set({ state: 'cancelled' });
	now = HOSPITAL_NOW;
	sms = new ScriptedChannel();
	mail = new ScriptedChannel();
});

function worker(channels: Partial<Channels> = {}, random = 0.5) {
	return new OutboxWorker({ channels: { sms, mail, ...channels }, now: () => now, random: () => random });
}

async function alertTo(userId: string, change: Parameters<typeof addAlert>[2] = {}) {
	return addAlert(await addEscalation(hospital), userId, change);
}

async function reminder(change: Parameters<typeof addReminder>[2] = {}) {
	return addReminder(await addVisit(hospital), hospital.patient.id, change);
}

async function mailTo(userId: string, change: Parameters<typeof addReminder>[2] = {}) {
	return addReminder(await addVisit(hospital), hospital.patient.id, {
		kind: 'mail',
		channel: 'mail',
		patientId: undefined,
		userId,
		subject: 'Something to read',
		...change
	});
}

describe('sending', () => {
	it('fills the link in, and stores neither link nor number', async () => {
		const { nurse } = hospital.people;
		const { id, linkId } = await alertTo(nurse.id);
		expect(await worker().settle()).toBe(1);
		const [user] = await db().select().from(users).where(eq(users.id, nurse.id));
		expect(sms.sent).toEqual([
			expect.objectContaining({
				to: user?.phone,
				body: `Ropewalk HIGH: Tern Ward, bed 4. To take it open http://127.0.0.1:4300/t/${linkToken(linkId)}`
			})
		]);
		const row = await rowOf(id);
		expect(row).toMatchObject({ state: 'accepted', sentAt: now, providerId: 'id-1', attempts: 1 });
		expect(row).toMatchObject({ leaseOwner: null, leaseUntil: null });
		expect(JSON.stringify(row)).not.toContain(linkToken(linkId));
		expect(await attemptsOf(id)).toMatchObject([{ number: 1, outcome: 'accepted', providerId: 'id-1' }]);
	});

	it('tells pages of every state, with the patient that it is about', async () => {
		const id = await reminder();
		await worker().settle();
		const events = await db().select().from(liveEvents).where(eq(liveEvents.subjectId, id));
		expect(events.map(({ kind }) => kind)).toEqual(['sending', 'accepted']);
		expect(new Set(events.map(({ topic, episodeId }) => `${topic} ${episodeId}`))).toEqual(
			new Set([`message ${hospital.episodeId}`])
		);
	});

	it.each([
		['a millisecond early', -1, 0],
		['on time', 0, 1]
	])('%s', async (_, offset, sent) => {
		const id = await reminder({ notBefore: HOSPITAL_NOW + HOUR });
		now = HOSPITAL_NOW + HOUR + offset;
		expect(await worker().settle()).toBe(sent);
		expect((await rowOf(id)).state).toBe(sent ? 'accepted' : 'ready');
	});

	it('shares the work of several workers, each message once', async () => {
		const ids = await Promise.all(Array.from({ length: 40 }, () => reminder()));
		const counts = await Promise.all([worker().settle(), worker().settle(), worker().settle()]);
		expect(counts.reduce((sum, count) => sum + count)).toBe(40);
		expect(sms.sent.map(({ id }) => id).sort()).toEqual(ids.sort());
	});

	it('is woken by a commit and stops when told', async () => {
		const started = worker();
		started.start();
		const id = await reminder();
		wakeWorkers();
		while (sms.sent.length === 0) {
			await new Promise((resolve) => setImmediate(resolve));
		}
		await started.stop();
		expect((await rowOf(id)).state).toBe('accepted');
		const later = await reminder();
		wakeWorkers();
		await started.stop();
		expect((await rowOf(later)).state).toBe('ready');
	});

	it('waits for what is on its way before it has stopped', async () => {
		const id = await reminder();
		const started = worker();
		sms.hold();
		started.start();
		while (sms.sent.length === 0) {
			await new Promise((resolve) => setImmediate(resolve));
		}
		const stopped = started.stop();
		sms.release();
		await stopped;
		expect((await rowOf(id)).state).toBe('accepted');
	});
});

describe('what does not go through', () => {
	it('tries a call for help after 5, 15 and 45 seconds, then it is a loose end on record', async () => {
		const { id } = await alertTo(hospital.people.nurse.id);
		sms.script = [transient(), transient(), transient(), transient()];
		const waits: number[] = [];
		for (let attempt = 1; attempt <= 3; attempt += 1) {
			await worker({}, 1).settle();
			const { nextAt, state } = await rowOf(id);
			expect(state).toBe('ready');
			waits.push(nextAt - now);
			now = nextAt;
		}
		await worker({}, 1).settle();
		expect(waits).toEqual([5 * SECOND, 15 * SECOND, 45 * SECOND]);
		expect(await rowOf(id)).toMatchObject({ state: 'failed', stateReason: 'gateway-down', attempts: 4 });
		const [onRecord] = await db().select().from(audit).where(eq(audit.objectId, id));
		expect(onRecord).toMatchObject({
			action: 'message.failed',
			actorId: 'chain',
			episodeId: hospital.episodeId,
			detail: { kind: 'escalation', channel: 'sms', reason: 'gateway-down' }
		});
		now += DAY;
		expect(await worker().settle()).toBe(0);
	});

	it.each([
		['opted-out', '21610'],
		['bad-address', '21211'],
		['refused', '400']
	] as const)('does not repeat what is refused for good: %s', async (reason, code) => {
		const { patient, episodeId } = await addPatient({ unitId: hospital.units.ward });
		const visitId = await addVisit({ ...hospital, episodeId });
		const id = await addReminder(visitId, patient.id);
		sms.script = [permanent(reason, code)];
		await worker().settle();
		expect(await rowOf(id)).toMatchObject({ state: 'failed', stateReason: reason });
		expect(await attemptsOf(id)).toMatchObject([{ outcome: 'permanent', code }]);
		const [row] = await db().select().from(patients).where(eq(patients.id, patient.id));
		expect(row?.smsOptedOutAt).toBe(reason === 'opted-out' ? now : null);
	});

	it('gives the gateway the time it asks for, from all messages', async () => {
		const first = await reminder();
		sms.script = [transient(20 * SECOND)];
		await worker({}, 0).settle();
		expect((await rowOf(first)).nextAt).toBe(now + 20 * SECOND);

		const asked = worker({}, 0);
		const second = await reminder();
		sms.script = [transient(20 * SECOND)];
		await asked.settle();
		await reminder();
		now += 20 * SECOND - 1;
		expect(await asked.settle()).toBe(0);
		now += 1;
		expect(await asked.settle()).toBe(3);
		expect((await rowOf(second)).state).toBe('accepted');
	});

	it.each([
		['reminder', 1, ['ECONNRESET', 'not-looked-up', 'not-looked-up', 'looked-up']],
		['answer', 2, ['ECONNRESET', 'ECONNRESET', 'not-looked-up', 'looked-up']]
	] as const)(
		'while the gateway cannot be asked, a message of unknown fate (%s) goes out so often: %i',
		async (kind, times, codes) => {
			const id = await reminder({ kind });
			sms.script = [unknown(), unknown()];
			sms.found = [null, null, [`SM-of-${kind}`]];
			const states: string[] = [];
			for (let round = 0; round < 4; round += 1) {
				await worker().settle();
				const row = await rowOf(id);
				states.push(row.state);
				now = row.nextAt;
			}
			expect(sms.sent).toHaveLength(times);
			expect(states).toEqual(['ready', 'ready', 'ready', 'accepted']);
			expect((await attemptsOf(id)).map(({ code }) => code)).toEqual(codes);
		}
	);

	it('sends a call for help of unknown fate again each time', async () => {
		const { id } = await alertTo(hospital.people.nurse.id);
		sms.script = [unknown(), unknown(), unknown(), unknown()];
		sms.found = [null, null, null];
		for (let round = 0; round < 4; round += 1) {
			await worker().settle();
			now = (await rowOf(id)).nextAt;
		}
		expect(sms.sent).toHaveLength(4);
		expect(await rowOf(id)).toMatchObject({ state: 'failed', stateReason: 'no-answer' });
	});

	it('sends a mail of unknown fate again under the same identifier', async () => {
		const id = await mailTo(hospital.people.surgeon.id);
		mail.lookUp = null;
		mail.script = [unknown()];
		await worker().settle();
		now = (await rowOf(id)).nextAt;
		await worker().settle();
		expect(mail.sent.map((message) => message.id)).toEqual([id, id]);
		expect((await rowOf(id)).state).toBe('accepted');
	});
});

describe('checked again at the moment of sending', () => {
	const skipped = (id: string) => rowOf(id).then(({ state, stateReason }) => [state, stateReason]);

	it.each(['taken', 'settled', 'withdrawn'] as const)(
		'an escalation that is %s calls nobody',
		async (state) => {
			const escalationId = await addEscalation(hospital);
			const { id } = await addAlert(escalationId, hospital.people.nurse.id);
			await db().update(escalations).set({ state }).where(eq(escalations.id, escalationId));
			await worker().settle();
			expect(await skipped(id)).toEqual(['skipped', 'escalation is not waiting for anybody']);
			expect(sms.sent).toEqual([]);
		}
	);

	it('an escalation that is passed on calls the one who is to confirm, and nobody else', async () => {
		const { nurse, physician } = hospital.people;
		const change = { state: 'taken', takenBy: nurse.id, passTo: physician.id } as const;
		const escalationId = await addEscalation(hospital, change);
		const receiver = await addAlert(escalationId, physician.id);
		const other = await addAlert(escalationId, hospital.nurse2.id);
		await worker().settle();
		expect((await rowOf(receiver.id)).state).toBe('accepted');
		expect((await rowOf(other.id)).state).toBe('skipped');
	});

	it('the number that a person has when it is sent, not the one of the call', async () => {
		const person = await addPerson({ role: 'nurse', unitIds: [hospital.units.ward], phone: newPhone() });
		const { id } = await addAlert(await addEscalation(hospital), person.id);
		const phone = newPhone();
		await db().update(users).set({ phone }).where(eq(users.id, person.id));
		await worker().settle();
		expect((await rowOf(id)).state).toBe('accepted');
		expect(sms.sent.map(({ to }) => to)).toEqual([phone]);
	});

	it('nobody whose account was disabled, and nobody without a number', async () => {
		const unitIds = [hospital.units.ward];
		const gone = await addPerson({ role: 'nurse', unitIds, disabledAt: HOSPITAL_NOW });
		const silent = await addPerson({ role: 'nurse', unitIds, phone: null });
		const escalationId = await addEscalation(hospital);
		const toGone = await addAlert(escalationId, gone.id);
		const toSilent = await addAlert(escalationId, silent.id);
		await worker().settle();
		expect(await skipped(toGone.id)).toEqual(['skipped', 'account disabled']);
		expect(await skipped(toSilent.id)).toEqual(['skipped', 'no telephone number']);
		expect(sms.sent).toEqual([]);
	});

	it.each([
		['somebody else’s', { userId: 'other' }],
		['used', { usedAt: HOSPITAL_NOW }],
		['expired', { expiresAt: HOSPITAL_NOW }]
	])('no link that is %s', async (_, change) => {
		const link = 'userId' in change ? { userId: hospital.nurse2.id } : change;
		const escalationId = await addEscalation(hospital);
		const { id } = await addAlert(escalationId, hospital.people.nurse.id, {}, link);
		await worker().settle();
		expect(await skipped(id)).toEqual(['skipped', 'link used, expired or not theirs']);
	});

	it('an alert that is too old fails, because somebody still waits', async () => {
		const { id } = await alertTo(hospital.people.nurse.id, { expiresAt: HOSPITAL_NOW });
		await worker().settle();
		expect(await skipped(id)).toEqual(['failed', 'expired']);
		expect(await db().$count(audit, eq(audit.objectId, id))).toBe(1);
	});

	it.each([
		['cancelled', { visit: { state: 'cancelled' } }, 'visit is over or cancelled'],
		['attended', { visit: { state: 'attended' } }, 'visit is over or cancelled'],
		['begun', { visit: { startsAt: HOSPITAL_NOW } }, 'too late'],
		['without consent', { patient: { smsConsent: false } }, 'no consent'],
		['after STOP', { patient: { smsOptedOutAt: 1 } }, 'opted out'],
		['without a number', { patient: { phone: null } }, 'no telephone number']
	] as const)('no reminder: %s', async (_, change, reason) => {
		const given = 'patient' in change ? change.patient : {};
		const { patient, episodeId } = await addPatient({ unitId: hospital.units.ward, ...given });
		const visitId = await addVisit({ ...hospital, episodeId }, 'visit' in change ? change.visit : {});
		const id = await addReminder(visitId, patient.id);
		await worker().settle();
		expect(await skipped(id)).toEqual(['skipped', reason]);
		expect(sms.sent).toEqual([]);
		expect(await attemptsOf(id)).toEqual([]);
	});

	it('a reminder waits for the patient’s morning, not for the hospital’s', async () => {
		// 09:00 in Dublin is 04:00 in New York; 8 o’clock there is 13:00 UTC before 8 March 2026.
		const { patient, episodeId } = await addPatient({
			unitId: hospital.units.ward,
			zone: 'America/New_York'
		});
		const visitId = await addVisit({ ...hospital, episodeId });
		const id = await addReminder(visitId, patient.id);
		await worker().settle();
		expect(await rowOf(id)).toMatchObject({
			state: 'ready',
			nextAt: Date.parse('2026-03-03T13:00:00Z'),
			attempts: 0
		});
		now = Date.parse('2026-03-03T13:00:00Z');
		await worker().settle();
		expect((await rowOf(id)).state).toBe('accepted');
	});

	it('no mail about a visit that is cancelled, and none to a disabled account', async () => {
		const gone = await addPerson({ role: 'surgeon', unitIds: [], disabledAt: HOSPITAL_NOW });
		const first = await mailTo(hospital.people.surgeon.id);
		await db()
			.update(visits)
			.set({ state: 'cancelled' })
			.where(eq(visits.id, (await rowOf(first)).refId));
		const second = await mailTo(gone.id);
		await worker().settle();
		expect(await skipped(first)).toEqual(['skipped', 'visit is over or cancelled']);
		expect(await skipped(second)).toEqual(['skipped', 'account disabled']);
	});
});

describe('without a gateway', () => {
	it('messages are held and shown as held, and go out once there is one', async () => {
		const id = await reminder();
		expect(await worker({ sms: null }).settle()).toBe(1);
		expect(await rowOf(id)).toMatchObject({ state: 'held', stateReason: 'no gateway', attempts: 0 });
		expect(await worker({ sms: null }).settle()).toBe(0);
		sms.script = [accepted('SM-1')];
		await worker().settle();
		expect(await rowOf(id)).toMatchObject({ state: 'accepted', stateReason: null, providerId: 'SM-1' });
	});

	it('what is held is judged by the time when it can go', async () => {
		const id = await reminder();
		await worker({ sms: null }).settle();
		now += 2 * DAY;
		await worker().settle();
		expect(await rowOf(id)).toMatchObject({ state: 'skipped', stateReason: 'too late' });
	});

	it('the other channel goes on', async () => {
		const id = await mailTo(hospital.people.surgeon.id);
		await worker({ sms: null }).settle();
		expect((await rowOf(id)).state).toBe('accepted');
		expect(await db().$count(episodes)).toBeGreaterThan(0);
	});
});
