import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { liveEvents, outbox } from '$lib/server/db/schema';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { ScriptedChannel, transient, unknown } from '../support/channels';
import { HOSPITAL_NOW } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { addAlert, addEscalation, addReminder, addVisit, attemptsOf, rowOf } from '../support/messages';

/** What becomes of messages that a killed process was sending: faults F2, F3 and F25. */

const SECOND = 1_000;
const MINUTE = 60 * SECOND;
const HOUR = 60 * MINUTE;

const hospital = await openHospital({ PORT: '4112' });
let sms: ScriptedChannel;
let now: number;

beforeEach(async () => {
	await db().update(outbox).set({ state: 'cancelled', leaseOwner: null, leaseUntil: null });
	now = HOSPITAL_NOW;
	sms = new ScriptedChannel();
});

function worker(channels: { sms?: ScriptedChannel } = {}) {
	return new OutboxWorker({ channels: { sms, mail: null, ...channels }, now: () => now, random: () => 0.5 });
}

async function reminder(change: Parameters<typeof addReminder>[2] = {}) {
	return addReminder(await addVisit(hospital), hospital.patient.id, change);
}

describe('a worker that is killed', () => {
	/** @param make the message that it was sending */
	async function abandoned(make: () => Promise<string> = reminder): Promise<string> {
		const id = await make();
		sms.hold();
		void worker().settle();
		while (sms.sent.length === 0) {
			await new Promise((resolve) => setImmediate(resolve));
		}
		// From here on nothing of that worker is heard of again, as after SIGKILL.
		sms = new ScriptedChannel();
		return id;
	}

	it.each([
		['just under', 60 * SECOND - 1, 0],
		['at', 60 * SECOND, 1]
	])('keeps its message until the lease ends: %s', async (_, later, seen) => {
		const id = await abandoned();
		now = HOSPITAL_NOW + later;
		expect(await worker().settle()).toBe(seen);
		expect((await rowOf(id)).state).toBe(seen ? 'accepted' : 'sending');
	});

	it('is not sent again when the gateway has it', async () => {
		const id = await abandoned();
		now = HOSPITAL_NOW + MINUTE;
		sms.found = [['SM-earlier']];
		await worker().settle();
		expect(sms.sent).toEqual([]);
		expect(await rowOf(id)).toMatchObject({ state: 'accepted', providerId: 'SM-earlier', attempts: 2 });
		expect(await attemptsOf(id)).toMatchObject([
			{ number: 1, outcome: 'unknown', code: 'interrupted', startedAt: HOSPITAL_NOW },
			{ number: 2, outcome: 'accepted', code: 'looked-up', providerId: 'SM-earlier' }
		]);
	});

	it('that was only slow does not undo what another worker did meanwhile', async () => {
		const id = await reminder();
		const slow = sms;
		slow.hold();
		slow.script = [transient()];
		const late = worker({ sms: slow }).settle();
		while (slow.sent.length === 0) {
			await new Promise((resolve) => setImmediate(resolve));
		}
		now = HOSPITAL_NOW + MINUTE;
		const quick = new ScriptedChannel();
		await worker({ sms: quick }).settle();
		slow.release();
		await late;
		expect(await rowOf(id)).toMatchObject({ state: 'accepted', providerId: 'id-1', leaseOwner: null });
		expect((await attemptsOf(id)).map(({ outcome }) => outcome)).toEqual([
			'unknown',
			'accepted',
			'transient'
		]);
		const events = await db().select().from(liveEvents).where(eq(liveEvents.subjectId, id));
		expect(events.map(({ kind }) => kind)).toEqual(['sending', 'sending', 'accepted']);
	});

	it('is not suspected by itself when the clock jumps while it sends', async () => {
		await reminder();
		sms.hold();
		const one = worker();
		const first = one.settle();
		while (sms.sent.length === 0) {
			await new Promise((resolve) => setImmediate(resolve));
		}
		now += HOUR;
		const later = await reminder();
		const second = one.settle();
		while (sms.sent.length === 1) {
			await new Promise((resolve) => setImmediate(resolve));
		}
		sms.release();
		await Promise.all([first, second]);
		expect(sms.sent).toHaveLength(2);
		expect(sms.sent[1]?.id).toBe(later);
	});

	it('does not take the same text of an earlier message for its own', async () => {
		const first = await reminder({ body: 'The same words.' });
		await worker().settle();
		const known = (await rowOf(first)).providerId ?? '';
		const id = await reminder({ body: 'The same words.' });
		sms.script = [unknown()];
		await worker().settle();
		now = (await rowOf(id)).nextAt;
		sms.found = [[known]];
		await worker().settle();
		expect(sms.sent.filter((message) => message.id === id)).toHaveLength(2);
	});

	describe('and started again', () => {
		/** As the server does it: by `start()`, with a new owner, in the instant after the kill. */
		async function restarted(): Promise<void> {
			const next = worker();
			next.start();
			await next.settle();
			await next.stop();
		}
		const alert = async () => (await addAlert(await addEscalation(hospital), hospital.people.nurse.id)).id;

		it.each([
			['a reminder', reminder],
			['a call for help', alert]
		])('%s that the gateway does not have goes out at once, once', async (_, make) => {
			const id = await abandoned(make);
			await restarted();
			expect(sms.asked.map((message) => message.id)).toEqual([id]);
			expect(sms.sent.map((message) => message.id)).toEqual([id]);
			expect(await rowOf(id)).toMatchObject({ state: 'accepted', leaseOwner: null, leaseUntil: null });
			expect(await attemptsOf(id)).toMatchObject([
				{ number: 1, outcome: 'unknown', code: 'interrupted', startedAt: HOSPITAL_NOW },
				{ number: 2, outcome: 'accepted', code: null }
			]);
		});

		it('one that the gateway has is not doubled', async () => {
			const id = await abandoned(alert);
			sms.found = [['SM-of-the-killed']];
			await restarted();
			expect(sms.sent).toEqual([]);
			expect(await rowOf(id)).toMatchObject({
				state: 'accepted',
				providerId: 'SM-of-the-killed',
				attempts: 2
			});
		});

		it('one that was cancelled or taken meanwhile is not sent', async () => {
			const escalation = await addEscalation(hospital);
			const id = await abandoned(async () => (await addAlert(escalation, hospital.people.nurse.id)).id);
			await addEscalation(hospital);
			await restarted();
			expect(sms.sent).toEqual([]);
			expect((await rowOf(id)).state).toBe('skipped');
		});

		it('killed again and again it is asked about each time, and each attempt is on record', async () => {
			const id = await abandoned();
			for (let kill = 0; kill < 3; kill += 1) {
				sms.hold();
				const killed = worker();
				killed.start();
				while (sms.sent.length === 0) {
					await new Promise((resolve) => setImmediate(resolve));
				}
				// It claims nothing more, as after SIGKILL; what hangs at the gateway is not waited for.
				void killed.stop();
				sms = new ScriptedChannel();
			}
			await restarted();
			expect((await rowOf(id)).state).toBe('accepted');
			expect((await attemptsOf(id)).map(({ code }) => code)).toEqual([
				...Array<string>(4).fill('interrupted'),
				null
			]);
		});

		it('its own messages are left alone', async () => {
			const id = await reminder();
			const own = worker();
			sms.hold();
			own.start();
			while (sms.sent.length === 0) {
				await new Promise((resolve) => setImmediate(resolve));
			}
			own.start();
			sms.release();
			await own.settle();
			await own.stop();
			expect((await attemptsOf(id)).map(({ outcome }) => outcome)).toEqual(['accepted']);
		});
	});
});
