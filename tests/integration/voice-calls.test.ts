import { and, asc, eq, sql } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import type { Person } from '$lib/domain/access/actor';
import type { Grade } from '$lib/domain/core/codes';
import { STAFF_CALLS } from '$lib/domain/messages/templates';
import { db } from '$lib/server/db';
import { escalations, escalationSteps, inboundMessages, outbox, units, users } from '$lib/server/db/schema';
import { chainJob } from '$lib/server/escalations/chain-job';
import { takeEscalation } from '$lib/server/escalations/take';
import { newId } from '$lib/server/ids';
import { receiveStatus } from '$lib/server/messages/receive-status';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { accepted, permanent, ScriptedChannel, transient, unknown } from '../support/channels';
import { callHook, signedPost } from '../support/hook-server';
import { HOSPITAL_NOW, addPerson, contextOf, newPhone } from '../support/hospital';
import { rowOf } from '../support/messages';
import { openHospital } from '../support/open-hospital';
import { coverPost, openWard, raiseOn } from '../support/own-ward';

/** A telephone that rings where a text did not get through, and the digit that takes the call for help. */

const PUBLIC_URL = 'https://ropewalk.saltmarsh.example';
const SECOND = 1_000;

const hospital = await openHospital({ PUBLIC_URL });
let sms: ScriptedChannel;
let voice: ScriptedChannel;
let now: number;
let ward: string;
let nurse: Person;
let phone: string;

beforeEach(async () => {
	await db().update(outbox).set({ state: 'cancelled', providerId: null });
	await db()
		.update(units)
		.set({ name: sql`${units.name} || ' ' || ${units.id}` });
	await db().update(escalations).set({ state: 'withdrawn', nextStepAt: null });
	sms = new ScriptedChannel();
	voice = new ScriptedChannel();
	now = HOSPITAL_NOW;
	({ ward, nurse, phone } = await openWard('Plover House'));
});

const settle = () =>
	new OutboxWorker({ channels: { sms, mail: null, voice }, now: () => now, random: () => 0.5 }).settle();

const raised = (grade: Grade = 'high') => raiseOn(hospital, ward, { grade });

const messagesOf = (id: string) =>
	db().select().from(outbox).where(eq(outbox.refId, id)).orderBy(asc(outbox.createdAt), asc(outbox.id));

async function escalationOf(id: string) {
	const [row] = await db().select().from(escalations).where(eq(escalations.id, id));
	return row;
}

/** A high call whose text was refused for good, so that the telephone has rung. */
async function rung() {
	sms.script = [permanent('bad-address', '21211')];
	const id = await raised();
	await settle();
	const [call] = voice.sent;
	if (!call) {
		throw new Error('No telephone rang.');
	}
	return { id, call };
}

describe('the telephone rings', () => {
	it('for a high call whose text was refused, at once, with nothing clinical', async () => {
		const { call } = await rung();
		expect(call).toMatchObject({
			to: phone,
			body: 'This is Ropewalk. High call for help. Plover House, bed 4. To take it, press 1.'
		});
	});

	it('at once where nobody knows whether the text went, and once however often it is tried', async () => {
		sms.script = [unknown(), unknown(), unknown(), unknown()];
		const id = await raised();
		await settle();
		expect(voice.sent).toHaveLength(1);
		for (const seconds of [5, 15, 45]) {
			now += seconds * SECOND;
			await settle();
		}
		expect([sms.sent.length, voice.sent.length]).toEqual([4, 1]);
		expect((await messagesOf(id)).map(({ channel }) => channel).sort()).toEqual(['sms', 'voice']);
	});

	it('after the last of the attempts where the gateway refuses each, not before', async () => {
		sms.script = [transient(), transient(), transient(), transient()];
		await raised();
		await settle();
		for (const seconds of [5, 15]) {
			now += seconds * SECOND;
			await settle();
		}
		expect([sms.sent.length, voice.sent.length]).toEqual([3, 0]);
		now += 45 * SECOND;
		await settle();
		expect([sms.sent.length, voice.sent.length]).toEqual([4, 1]);
	});

	it('when the network tells that the text did not arrive', async () => {
		sms.script = [accepted('SM-lost')];
		await raised();
		await settle();
		expect(voice.sent).toEqual([]);
		const form = new Map([
			['MessageSid', 'SM-lost'],
			['MessageStatus', 'undelivered']
		]);
		await receiveStatus(form, now);
		await receiveStatus(form, now);
		await settle();
		expect(voice.sent).toHaveLength(1);
	});

	it.each(['medium', 'low'] as const)('for no %s call', async (grade) => {
		sms.script = [permanent('refused'), permanent('refused')];
		await raised(grade);
		await settle();
		expect(voice.sent).toEqual([]);
	});

	it('not any more once somebody has it', async () => {
		sms.script = [unknown()];
		const id = await raised();
		voice.hold();
		await new OutboxWorker({ channels: { sms, mail: null }, now: () => now, random: () => 0.5 }).settle();
		await takeEscalation(contextOf(nurse), id, null);
		voice.release();
		await settle();
		expect(voice.sent).toEqual([]);
		const call = (await messagesOf(id)).find(({ channel }) => channel === 'voice');
		expect(call?.state).toBe('cancelled');
	});

	it('and stands in the history of the call, beside the text', async () => {
		const { id } = await rung();
		const steps = await db()
			.select({ channel: escalationSteps.channel, userId: escalationSteps.userId })
			.from(escalationSteps)
			.where(and(eq(escalationSteps.escalationId, id), eq(escalationSteps.userId, nurse.id)))
			.orderBy(asc(escalationSteps.id));
		expect(steps).toEqual([
			{ channel: 'sms', userId: nurse.id },
			{ channel: 'voice', userId: nurse.id }
		]);
	});
});

describe('a step whose people cannot be reached', () => {
	it('does not wait for its timer: the next is told at once', async () => {
		const doctor = await addPerson({ role: 'physician', unitIds: [ward], phone: newPhone() });
		await coverPost(ward, doctor, 'physician');
		sms.script = [permanent('bad-address')];
		const id = await raised('medium');
		await settle();
		expect((await escalationOf(id))?.nextStepAt).toBe(now);
		// The second step is the same nurse again, whose number is as bad.
		sms.script = [permanent('bad-address')];
		await chainJob.run(now);
		await settle();
		await chainJob.run(now);
		await settle();
		expect(sms.sent.at(-1)?.body).toContain('Plover House');
		expect((await messagesOf(id)).at(-1)).toMatchObject({ userId: doctor.id, state: 'accepted' });
	});

	it('keeps the timer while one of them may still hear of it', async () => {
		sms.script = [permanent('bad-address')];
		const id = await raised('high');
		const planned = (await escalationOf(id))?.nextStepAt;
		voice.script = [transient()];
		await settle();
		expect((await escalationOf(id))?.nextStepAt).toBe(planned);
	});

	it('at the end of the chain keeps to the timer of the repeats', async () => {
		const id = await raised('low');
		await db().update(escalations).set({ nextStep: 3 }).where(eq(escalations.id, id));
		const planned = (await escalationOf(id))?.nextStepAt;
		sms.script = [permanent('bad-address')];
		await settle();
		expect((await escalationOf(id))?.nextStepAt).toBe(planned);
	});
});

const CALL_ID = 'CA00000000000000000000000000000001';

/** Post a digit as the gateway does. @returns what is said to it */
async function press(messageId: string, change: Record<string, string> = {}): Promise<string> {
	const fields = { CallSid: CALL_ID, CallStatus: 'in-progress', To: phone, Digits: '1', ...change };
	const response = await callHook(
		signedPost(PUBLIC_URL, `/api/hooks/voice?message=${messageId}`, fields),
		now
	);
	expect(response.status).toBe(200);
	return response.text();
}

describe('a digit', () => {
	beforeEach(() => db().delete(inboundMessages));

	it('takes the call for help, on record as who pressed it', async () => {
		const { id, call } = await rung();
		expect(await press(call.id)).toContain('It is yours. Plover House, bed 4. Please go now.');
		expect(await escalationOf(id)).toMatchObject({ state: 'taken', takenBy: nurse.id, nextStepAt: null });
		const [kept] = await db().select().from(inboundMessages);
		expect(kept).toMatchObject({ userId: nurse.id, understoodAs: 'take', fromNumber: phone });
	});

	it('posted again, many times at once, has one effect', async () => {
		const { id, call } = await rung();
		const said = await Promise.all(Array.from({ length: 20 }, () => press(call.id)));
		expect(new Set(said)).toEqual(new Set([expect.stringContaining('It is yours.')]));
		expect(await db().$count(inboundMessages)).toBe(1);
		await db().update(escalations).set({ state: 'raised', takenBy: null }).where(eq(escalations.id, id));
		expect(await press(call.id)).toContain(STAFF_CALLS['not-taken'].en({}));
		expect((await escalationOf(id))?.state).toBe('raised');
	});

	it('after somebody else is told who has it', async () => {
		const { id, call } = await rung();
		const other = await addPerson({ role: 'physician', unitIds: [ward], phone: newPhone() });
		await takeEscalation(contextOf(other), id, null);
		expect(await press(call.id)).toMatch(/Not yours\. A doctor has it since \d\d:\d\d\./);
		expect((await escalationOf(id))?.takenBy).toBe(other.id);
	});

	it('after its end is told so', async () => {
		const { id, call } = await rung();
		await db().update(escalations).set({ state: 'withdrawn', endedAt: now }).where(eq(escalations.id, id));
		expect(await press(call.id)).toContain('Not taken. It is over since');
	});

	it.each(['2', '', '11'])('that is %j takes nothing, and is asked for again', async (Digits) => {
		const { id, call } = await rung();
		const said = await press(call.id, { Digits });
		expect(said).toContain('To take it, press 1.');
		expect(said).toContain('<Gather');
		expect((await escalationOf(id))?.state).toBe('raised');
	});

	it.each([
		['a number that is not theirs any more', { To: '+353869999999' }, (id: string) => id],
		['a message that is none', {}, () => 'none']
	])('to %s takes nothing', async (_, change, messageId) => {
		const { id, call } = await rung();
		expect(await press(messageId(call.id), change)).toContain('Not taken.');
		expect((await escalationOf(id))?.state).toBe('raised');
	});

	it('of somebody who left the unit takes nothing', async () => {
		const { id, call } = await rung();
		await db().update(users).set({ disabledAt: now }).where(eq(users.id, nurse.id));
		expect(await press(call.id)).toContain('Not taken.');
		expect((await escalationOf(id))?.state).toBe('raised');
	});

	it('without a signature, or signed for another message, is refused', async () => {
		const { id, call } = await rung();
		const fields = { CallSid: CALL_ID, To: phone, Digits: '1' };
		const path = `/api/hooks/voice?message=${call.id}`;
		const other = `${PUBLIC_URL}/api/hooks/voice?message=other`;
		for (const change of [{ signature: null }, { signedUrl: other }, { token: 'wrong' }]) {
			expect((await callHook(signedPost(PUBLIC_URL, path, fields, change), now)).status).toBe(403);
		}
		expect((await escalationOf(id))?.state).toBe('raised');
	});
});

describe('what became of the ringing', () => {
	it.each([
		[['initiated', 'ringing', 'in-progress', 'completed'], 'delivered'],
		[['completed', 'ringing', 'ringing'], 'delivered'],
		[['ringing', 'no-answer'], 'undelivered'],
		[['busy'], 'undelivered'],
		[['ringing'], 'accepted']
	])('%j: %s', async (statuses, state) => {
		const callId = `CA-${newId()}`;
		voice.script = [accepted(callId)];
		const { call } = await rung();
		for (const status of statuses) {
			const fields = { CallSid: callId, CallStatus: status };
			const told = await callHook(signedPost(PUBLIC_URL, '/api/hooks/voice-status', fields), now);
			expect(told.status).toBe(200);
		}
		expect((await rowOf(call.id)).state).toBe(state);
	});
});
