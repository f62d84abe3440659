import { and, asc, eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import type { Person } from '$lib/domain/access/actor';
import type { Grade } from '$lib/domain/core/codes';
import { signOut } from '$lib/server/accounts/sign-in';
import { endCredentials } from '$lib/server/auth/credentials';
import { db, transact } from '$lib/server/db';
import { audit, escalationSteps, outbox, pushDevices, users } from '$lib/server/db/schema';
import { env } from '$lib/server/env';
import { takeEscalation } from '$lib/server/escalations/take';
import { newId } from '$lib/server/ids';
import { linkToken } from '$lib/server/links';
import { openChannels } from '$lib/server/outbox/channels';
import { pushChannel } from '$lib/server/outbox/channels/push';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { addDevice, devicesOf, removeDevice, takeOverDevice, tryDevice } from '$lib/server/push/devices';
import { ScriptedChannel } from '../support/channels';
import { Jar } from '../support/cookies';
import { addPerson, contextOf, HOSPITAL_NOW, newPhone } from '../support/hospital';
import { attemptsOf, rowOf } from '../support/messages';
import { openGateway } from '../support/open-gateway';
import { pushedDevice, pushFault, subscribe, takePermissionAway, type Subscription } from '../support/push';
import { openWard, raiseOn } from '../support/own-ward';

/** Notices on devices, sent by the real library to the stand-in for the push service. */

const { gateway, hospital } = await openGateway();
const SECOND = 1_000;
let now: number;
let ward: string;
let nurse: Person;
let phone: Subscription;
let deviceId: string;

beforeEach(async () => {
	await pushFault(gateway, 'ok');
	await db().update(outbox).set({ state: 'cancelled' });
	await db().delete(pushDevices);
	now = HOSPITAL_NOW;
	({ ward, nurse } = await openWard());
	({ phone, deviceId } = await turnedOn(nurse));
});

/** A device of a person's that shows notices. */
async function turnedOn(person: Person, tokenHash: string = newId(), signInId: string | null = null) {
	const subscription = await subscribe(gateway, person.name, env().push?.publicKey);
	const browser = { kind: 'phone' as const, tokenHash, signInId };
	const { result } = await addDevice(contextOf(person), subscription, browser);
	return { phone: subscription, deviceId: result.id };
}

const worker = (change: object = {}) =>
	new OutboxWorker({
		channels: { ...openChannels(env()), ...change },
		now: () => now,
		random: () => 0.5
	});

const raised = (grade: Grade = 'high', bed = '4') => raiseOn(hospital, ward, { grade }, bed);

async function noticeOf(refId: string) {
	const [row] = await db()
		.select()
		.from(outbox)
		.where(and(eq(outbox.refId, refId), eq(outbox.channel, 'push')));
	if (!row) {
		throw new Error('No notice was written.');
	}
	return row;
}

const shown = async (device = phone) => (await pushedDevice(gateway, device))?.notices ?? [];

describe('a call for help', () => {
	it.each(['high', 'medium', 'low'] as const)(
		'of grade %s is shown at once, beside the text',
		async (grade) => {
			const id = await raised(grade);
			await worker().settle();
			const { linkId } = await noticeOf(id);
			const unit = `Plover ${ward.slice(-6)}`;
			expect(await shown()).toEqual([
				{
					...{ id: expect.any(String) as string, at: expect.any(String) as string },
					...{ urgency: 'high', topic: id.replaceAll('-', ''), ttlSeconds: 3600 },
					payload: {
						title: `Ropewalk ${grade.toUpperCase()}`,
						body: `${unit}, bed 4. Somebody is needed. Tap to open it.`,
						url: `${env().publicUrl}/t/${linkToken(linkId ?? '')}`,
						tag: id.replaceAll('-', '')
					}
				}
			]);
			const [text] = await gateway.messagesOf((await userOf(nurse)).phone ?? '');
			expect(text?.body).toContain('To take it open');
		}
	);

	it('goes to every device of its reader, and stands in its history beside the text', async () => {
		const { phone: desk } = await turnedOn(nurse);
		const id = await raised();
		await worker().settle();
		expect([(await shown()).length, (await shown(desk)).length]).toEqual([1, 1]);
		const steps = await db()
			.select({ channel: escalationSteps.channel, state: outbox.state })
			.from(escalationSteps)
			.innerJoin(outbox, eq(outbox.id, escalationSteps.messageId))
			.where(and(eq(escalationSteps.escalationId, id), eq(escalationSteps.userId, nurse.id)))
			.orderBy(asc(escalationSteps.channel));
		expect(steps).toEqual([
			{ channel: 'push', state: 'accepted' },
			{ channel: 'push', state: 'accepted' },
			{ channel: 'sms', state: expect.stringMatching(/^(accepted|delivered)$/) as string }
		]);
	});

	it('that somebody has by then is not shown any more, and afterwards who has it takes its place', async () => {
		const other = await addPerson({ role: 'physician', unitIds: [ward], phone: newPhone() });
		const { phone: late } = await turnedOn(other);
		const id = await raised();
		await worker().settle();
		await takeEscalation(contextOf(other), id, null);
		now += 10 * SECOND;
		await worker().settle();
		const [only, ...more] = await shown();
		expect(more).toEqual([]);
		expect(only?.payload.body).toContain('A doctor has it. You need do nothing.');
		expect(only?.payload.url).toBe(`${env().publicUrl}/escalations/${id}`);
		expect(await shown(late)).toEqual([]);
	});
});

async function userOf({ id }: Person) {
	const [user] = await db().select().from(users).where(eq(users.id, id));
	if (!user) {
		throw new Error('Nobody.');
	}
	return user;
}

describe('the push service', () => {
	it.each(['404', '410'])('that answers %s removes the device, and nothing is sent again', async (mode) => {
		await pushFault(gateway, mode, 1);
		const id = await raised();
		await worker().settle();
		expect(await noticeOf(id)).toMatchObject({ state: 'failed', stateReason: 'gone' });
		expect(await devicesOf(contextOf(nurse), null)).toEqual([]);
		await raised('high', '5');
		await worker().settle();
		expect(await shown()).toEqual([]);
	});

	it('is not asked about a device that took its permission away twice', async () => {
		await takePermissionAway(gateway, phone);
		const id = await raised();
		await worker().settle();
		expect((await noticeOf(id)).stateReason).toBe('gone');
		expect(await db().$count(pushDevices)).toBe(0);
	});

	it('that asks for time gets it', async () => {
		await pushFault(gateway, '429', 1);
		const id = await raised();
		await worker().settle();
		const row = await noticeOf(id);
		// Half of the five seconds of the schedule is more than the one second that was asked for.
		expect(row).toMatchObject({ state: 'ready', stateReason: 'busy', nextAt: now + 2_500 });
		now = row.nextAt;
		await worker().settle();
		expect(await shown()).toHaveLength(1);
	});

	it('that is down is tried again, and the device keeps when it failed and when it worked', async () => {
		await pushFault(gateway, '500', 1);
		const id = await raised();
		await worker().settle();
		expect((await noticeOf(id)).stateReason).toBe('gateway-down');
		now += 5 * SECOND;
		await worker().settle();
		const [device] = await devicesOf(contextOf(nurse), null);
		expect(device).toMatchObject({ lastFailureAt: HOSPITAL_NOW, lastSuccessAt: now });
	});

	it.each(['hang', 'accept-then-drop', 'refuse'])(
		'%s: unknown, and sent again it stands once',
		async (mode) => {
			await pushFault(gateway, mode, 1);
			const { push } = env();
			const impatient = push && pushChannel(push, 200);
			const id = await raised();
			await worker({ push: impatient }).settle();
			const { id: messageId } = await noticeOf(id);
			expect((await attemptsOf(messageId)).map(({ outcome }) => outcome)).toEqual(['unknown']);
			now += 5 * SECOND;
			await worker({ push: impatient }).settle();
			expect((await rowOf(messageId)).state).toBe('accepted');
			expect(await shown()).toHaveLength(1);
		}
	);

	it('that is not there says nothing was sent', async () => {
		const { push } = env();
		const nowhere = { ...phone, endpoint: 'https://127.0.0.1:1/push/to/a' };
		const channel = push && pushChannel({ ...push, hosts: ['127.0.0.1:1'] });
		const notice = { keys: nowhere.keys, link: '/', topic: 'a', urgent: true, ttlSeconds: 60 };
		const message = { id: newId(), to: nowhere.endpoint, name: null, subject: 'A', body: 'B', notice };
		expect(await channel?.send(message)).toEqual({
			outcome: { kind: 'transient', reason: 'not-reached', retryAfter: null },
			code: 'ECONNREFUSED'
		});
	});

	it('without keys of ours is not written to: what waits is held and shown as held', async () => {
		const id = await raised();
		await worker({ push: null }).settle();
		expect(await noticeOf(id)).toMatchObject({ state: 'held', stateReason: 'no gateway' });
		expect(await shown()).toEqual([]);
		await worker().settle();
		expect(await shown()).toHaveLength(1);
	});

	it('waits no longer than eight seconds by default, and never for another channel', async () => {
		const slow = new ScriptedChannel();
		slow.hold();
		await raised();
		const working = worker({ push: slow });
		const settled = working.settle();
		await expect.poll(() => slow.inFlight).toBe(1);
		const { phone: number } = await userOf(nurse);
		await expect.poll(async () => (await gateway.messagesOf(number ?? '')).length).toBe(1);
		slow.release();
		await settled;
	});
});

describe('a device', () => {
	it.each(['https://127.0.0.1:1/push/to/a', 'http://127.0.0.1/', 'https://push.example/to/a'])(
		'at %s is refused: no push service that is allowed',
		async (endpoint) => {
			const browser = { kind: 'phone' as const, tokenHash: newId(), signInId: null };
			const added = addDevice(contextOf(nurse), { ...phone, endpoint }, browser);
			await expect(added).rejects.toMatchObject({ code: 'invalid' });
		}
	);

	it('is one, however often it is turned on, and belongs to who did so last', async () => {
		const other = await addPerson({ role: 'nurse', unitIds: [ward] });
		const browser = { kind: 'phone' as const, tokenHash: newId(), signInId: null };
		await addDevice(contextOf(nurse), phone, browser);
		await addDevice(contextOf(other), phone, browser);
		expect(await devicesOf(contextOf(nurse), null)).toEqual([]);
		expect(await devicesOf(contextOf(other), browser.tokenHash)).toMatchObject([{ here: true }]);
	});

	it('beyond the tenth is refused', async () => {
		for (let n = 1; n < 10; n += 1) {
			await turnedOn(nurse);
		}
		await expect(turnedOn(nurse)).rejects.toMatchObject({ code: 'wrong-state' });
	});

	it('can be tried', async () => {
		await tryDevice(contextOf(nurse), deviceId);
		await worker().settle();
		expect((await shown()).map(({ payload }) => payload.url)).toEqual([`${env().publicUrl}/account`]);
	});

	it('of somebody else is not there', async () => {
		const other = contextOf(hospital.people.nurse);
		await expect(tryDevice(other, deviceId)).rejects.toMatchObject({ code: 'not-found' });
		await expect(removeDevice(other, deviceId)).rejects.toMatchObject({ code: 'not-found' });
	});

	it('that is turned off before a notice leaves gets none', async () => {
		const id = await raised();
		await removeDevice(contextOf(nurse), deviceId);
		await worker().settle();
		expect(await noticeOf(id)).toMatchObject({ state: 'skipped', stateReason: 'notices are turned off' });
		expect(await shown()).toEqual([]);
	});

	it('whose owner signs out on it is removed, on record, also when the sign-in had ended before', async () => {
		for (const actor of [nurse, null]) {
			const jar = Jar.empty();
			jar.set('ropewalk-device', 'a secret');
			const { deviceIn } = await import('$lib/server/push/cookie');
			await turnedOn(nurse, deviceIn(jar) ?? '');
			await signOut({ ...contextOf(nurse), actor }, jar);
			expect(await db().$count(pushDevices, eq(pushDevices.tokenHash, deviceIn(jar) ?? 'none'))).toBe(0);
			expect(jar.get('ropewalk-device')).toBeUndefined();
		}
		const removed = await db().select().from(audit).where(eq(audit.action, 'account.device-removed'));
		expect(removed.length).toBeGreaterThanOrEqual(2);
		expect(await devicesOf(contextOf(nurse), null)).toHaveLength(1);
	});

	it('on which somebody else signs in shows nothing of the first any more; their own stays', async () => {
		const mark = newId();
		await turnedOn(nurse, mark);
		await transact((tx) => takeOverDevice(tx, mark, nurse.id, 'next'));
		const [kept] = await db().select().from(pushDevices).where(eq(pushDevices.tokenHash, mark));
		expect(kept?.signInId).toBe('next');
		await transact((tx) => takeOverDevice(tx, mark, hospital.people.nurse.id, 'other'));
		expect(await db().$count(pushDevices, eq(pushDevices.tokenHash, mark))).toBe(0);
	});

	it('ends with the credentials of its account, but for the one that stays signed in', async () => {
		await turnedOn(nurse, newId(), 'desk');
		await turnedOn(nurse, newId(), 'stolen');
		await transact((tx) => endCredentials(tx, nurse.id, now, 'password-set', 'desk'));
		const left = await db().select().from(pushDevices).where(eq(pushDevices.userId, nurse.id));
		expect(left.map(({ signInId }) => signInId)).toEqual(['desk']);
		await transact((tx) => endCredentials(tx, nurse.id, now, 'disabled'));
		expect(await devicesOf(contextOf(nurse), null)).toEqual([]);
	});
});
