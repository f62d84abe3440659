import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import type { Person } from '$lib/domain/access/actor';
import type { Grade } from '$lib/domain/core/codes';
import { db } from '$lib/server/db';
import { escalations, escalationSteps, outbox, pushDevices, users } from '$lib/server/db/schema';
import { env } from '$lib/server/env';
import { newId } from '$lib/server/ids';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { permanent, ScriptedChannel, transient, unknown } from '../support/channels';
import { HOSPITAL_NOW } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { openWard, raiseOn } from '../support/own-ward';

/** A medium or low call whose text does not get through: the notice that went beside it, and then a mail. */

const hospital = await openHospital({ PUBLIC_URL: 'https://ropewalk.saltmarsh.example' });
const SECOND = 1_000;
let sms: ScriptedChannel;
let push: ScriptedChannel;
let mail: ScriptedChannel;
let now: number;
let ward: string;
let nurse: Person;

beforeEach(async () => {
	await db().update(outbox).set({ state: 'cancelled' });
	[sms, push, mail] = [new ScriptedChannel(), new ScriptedChannel(), new ScriptedChannel()];
	push.lookUp = mail.lookUp = null;
	now = HOSPITAL_NOW;
	({ ward, nurse } = await openWard());
});

const settle = () =>
	new OutboxWorker({
		channels: { sms, mail, push, voice: null },
		now: () => now,
		random: () => 0.5
	}).settle();

async function withDevice(): Promise<void> {
	const id = newId();
	const keys = { endpoint: `https://push.example/${id}`, p256dh: 'a', auth: 'b' };
	const device = { id, userId: nurse.id, kind: 'phone' as const, tokenHash: id, createdAt: now };
	await db()
		.insert(pushDevices)
		.values({ ...device, ...keys });
}

const raised = (grade: Grade) => raiseOn(hospital, ward, { grade });

describe.each(['medium', 'low'] as const)('of a %s call', (grade) => {
	it('a text that was refused is followed by a mail, with nothing clinical, at once', async () => {
		sms.script = [permanent('bad-address')];
		await raised(grade);
		await settle();
		const [user] = await db().select().from(users).where(eq(users.id, nurse.id));
		const unit = `Plover ${ward.slice(-6)}`;
		expect(mail.sent).toMatchObject([{ to: user?.email, subject: `Ropewalk ${grade.toUpperCase()}` }]);
		const link = `${env().publicUrl}/t/`;
		expect(mail.sent[0]?.body).toContain(`${unit}, bed 4. Somebody is needed. To take it open:\n\n${link}`);
	});

	it('a text of unknown fate is followed by one mail, however often it is tried', async () => {
		sms.script = [unknown(), unknown(), unknown(), unknown()];
		await raised(grade);
		await settle();
		for (const seconds of [5, 15, 45]) {
			now += seconds * SECOND;
			await settle();
		}
		expect([sms.sent.length, mail.sent.length]).toEqual([4, 1]);
	});

	it('no mail goes where a notice beside the text got through', async () => {
		await withDevice();
		sms.script = [permanent('bad-address')];
		await raised(grade);
		await settle();
		expect([push.sent.length, mail.sent.length]).toEqual([1, 0]);
	});

	it('where the notice fails after the text a mail goes', async () => {
		await withDevice();
		sms.script = [permanent('bad-address')];
		push.script = [transient(), transient(), transient(), transient()];
		await raised(grade);
		await settle();
		expect(mail.sent).toEqual([]);
		for (const seconds of [5, 15, 45]) {
			now += seconds * SECOND;
			await settle();
		}
		expect([push.sent.length, mail.sent.length]).toEqual([4, 1]);
	});

	it('a notice that fails beside a text that went asks for no mail', async () => {
		await withDevice();
		push.script = [permanent('refused')];
		await raised(grade);
		await settle();
		expect([sms.sent.length, mail.sent.length]).toEqual([1, 0]);
	});

	it('the next people do not wait for the mailbox, and the history names the mail', async () => {
		sms.script = [permanent('bad-address')];
		const id = await raised(grade);
		await settle();
		const [row] = await db().select().from(escalations).where(eq(escalations.id, id));
		expect(row?.nextStepAt).toBe(now);
		const steps = await db().select().from(escalationSteps).where(eq(escalationSteps.escalationId, id));
		const told = steps.filter(({ userId }) => userId === nurse.id).map(({ channel }) => channel);
		expect(told.toSorted()).toEqual(['mail', 'sms']);
	});
});

it('of a high call no mail goes: the telephone rings', async () => {
	sms.script = [permanent('bad-address')];
	await raised('high');
	await settle();
	expect(mail.sent).toEqual([]);
});

it('the text alone is the loose end, not the mail after it', async () => {
	sms.script = [permanent('bad-address')];
	mail.script = [permanent('refused')];
	await raised('low');
	await settle();
	const { coordinator } = hospital.people;
	const { mine } = await looseEndsOf(db(), { ...coordinator, unitIds: [ward] }, now);
	expect(mine.filter(({ kind }) => kind === 'message-failed')).toHaveLength(1);
});
