import { asc, desc, eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { audit, inboundMessages, liveEvents, outbox, smsStatuses } from '$lib/server/db/schema';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { ScriptedChannel, accepted } from '../support/channels';
import { callHook, signedPost } from '../support/hook-server';
import { HOSPITAL_NOW } from '../support/hospital';
import { addReminder, rowOf } from '../support/messages';
import { openHospital } from '../support/open-hospital';
import { PUBLIC_URL, newSid, remindedPatient, text } from '../support/patient-texts';

const hospital = await openHospital({ PUBLIC_URL });
const reminded = () => remindedPatient(hospital);

describe('the signature', () => {
	const fields = text('+353865550000', 'YES');
	const path = '/api/hooks/sms';

	it.each([
		['missing', { signature: null }],
		['empty', { signature: '' }],
		['made up', { signature: 'AAAAAAAAAAAAAAAAAAAAAAAAAAA=' }],
		['by another token', { token: 'another' }],
		['for another host', { signedUrl: `https://elsewhere.example${path}` }],
		['for http', { signedUrl: `http://ropewalk.saltmarsh.example${path}` }],
		['for another port', { signedUrl: `https://ropewalk.saltmarsh.example:8443${path}` }],
		['for another path', { signedUrl: `${PUBLIC_URL}/api/hooks/sms-status` }],
		[
			'for the host that the request names',
			{ host: 'http://127.0.0.1:3000', signedUrl: `http://127.0.0.1:3000${path}` }
		]
	])('%s: 403 and nothing stored', async (_, change) => {
		const before = await db().$count(inboundMessages);
		const answer = await callHook(signedPost(PUBLIC_URL, path, fields, change));
		expect(answer.status).toBe(403);
		expect(answer.headers.get('content-type')).toBe('application/problem+json');
		expect(await answer.json()).toMatchObject({ type: 'wrong-signature', status: 403 });
		expect(await db().$count(inboundMessages)).toBe(before);
	});

	it('a changed field does not fit', async () => {
		const request = signedPost(PUBLIC_URL, path, fields);
		const forged = new Request(request, { body: new URLSearchParams({ ...fields, Body: 'NO' }) });
		expect((await callHook(forged)).status).toBe(403);
	});

	it('fits whatever host a proxy asks with, and is answered with an empty document', async () => {
		const request = signedPost(PUBLIC_URL, path, text('+353865550000', 'Hello'), {
			host: 'http://127.0.0.1:3000'
		});
		const answer = await callHook(request);
		expect(answer.status).toBe(200);
		expect(answer.headers.get('content-type')).toMatch(/^text\/xml/);
		expect(await answer.text()).toBe('<?xml version="1.0" encoding="UTF-8"?><Response/>');
	});

	it.each(['MessageSid', 'From'])('a signed call without %s is malformed', async (name) => {
		const { [name as 'From']: _, ...rest } = text('+353865550000', 'YES');
		const answer = await callHook(signedPost(PUBLIC_URL, path, rest));
		expect(answer.status).toBe(400);
		expect(await answer.json()).toMatchObject({ detail: `${name} is missing.` });
	});
});

describe('the status of a message', () => {
	beforeEach(async () => {
		await db().update(outbox).set({ state: 'cancelled' }).where(eq(outbox.state, 'ready'));
	});

	async function told(sid: string, status: string, more: Record<string, string> = {}, now = HOSPITAL_NOW) {
		const fields = { MessageSid: sid, MessageStatus: status, ...more };
		return callHook(signedPost(PUBLIC_URL, '/api/hooks/sms-status', fields), now);
	}

	/** A reminder that the gateway has accepted under a new identifier. */
	async function acceptedReminder(before: (sid: string) => Promise<unknown> = () => Promise.resolve()) {
		const { patient, visitId } = await reminded();
		const id = await addReminder(visitId, patient.id);
		const sid = newSid();
		const sms = new ScriptedChannel();
		sms.script = [accepted(sid)];
		await before(sid);
		await new OutboxWorker({ channels: { sms, mail: null }, now: () => HOSPITAL_NOW }).settle();
		expect((await rowOf(id)).providerId).toBe(sid);
		return { id, sid };
	}

	it.each([
		['in order', ['queued', 'sending', 'sent', 'delivered'], 'delivered'],
		['late', ['delivered', 'sent', 'queued'], 'delivered'],
		['only the beginning', ['queued', 'sent'], 'accepted'],
		['not delivered', ['sent', 'undelivered'], 'undelivered'],
		['failed', ['failed', 'sent'], 'undelivered'],
		['delivered after all', ['undelivered', 'delivered'], 'delivered'],
		['a word that nobody knows', ['sent', 'teleported'], 'accepted']
	])('%s', async (_, statuses, state) => {
		const { id, sid } = await acceptedReminder();
		for (const status of statuses) {
			const answer = await told(sid, status);
			expect(answer.status).toBe(200);
			expect(await answer.text()).toContain('<Response/>');
		}
		expect((await rowOf(id)).state).toBe(state);
	});

	/** Fault F16, as are the orders above; several hundred at once are in the tests of the whole product. */
	it('forty callbacks at once, each many times, end in one place', async () => {
		const { id, sid } = await acceptedReminder();
		const all = Array.from({ length: 10 }, () => ['delivered', 'queued', 'sent', 'sending']).flat();
		await Promise.all(all.map((status) => told(sid, status)));
		expect((await rowOf(id)).state).toBe('delivered');
		expect(await db().$count(smsStatuses, eq(smsStatuses.providerId, sid))).toBe(4);
		const events = await db()
			.select()
			.from(liveEvents)
			.where(eq(liveEvents.subjectId, id))
			.orderBy(asc(liveEvents.id));
		expect(events.map(({ kind }) => kind)).toEqual(['sending', 'accepted', 'delivered']);
	});

	it('that comes before our own record of the sending is not lost', async () => {
		const { id } = await acceptedReminder((sid) => told(sid, 'delivered'));
		expect((await rowOf(id)).state).toBe('delivered');
	});

	it('of a message that did not arrive is a loose end, and on record once', async () => {
		const { id, sid } = await acceptedReminder();
		await told(sid, 'undelivered', { ErrorCode: '30003' });
		await told(sid, 'undelivered', { ErrorCode: '30003' });
		expect(await rowOf(id)).toMatchObject({
			state: 'undelivered',
			stateReason: 'undelivered, gateway code 30003'
		});
		const onRecord = await db().select().from(audit).where(eq(audit.objectId, id)).orderBy(desc(audit.seq));
		expect(onRecord.map(({ action }) => action)).toEqual(['message.failed']);
		const { mine } = await looseEndsOf(db(), hospital.people.coordinator, HOSPITAL_NOW);
		expect(mine).toContainEqual(expect.objectContaining({ kind: 'message-failed', id }));
	});

	it('of a message that is not ours changes nothing', async () => {
		expect((await told(newSid(), 'delivered')).status).toBe(200);
	});

	it('needs its signature', async () => {
		const fields = { MessageSid: newSid(), MessageStatus: 'delivered' };
		const request = signedPost(PUBLIC_URL, '/api/hooks/sms-status', fields, { signature: null });
		expect((await callHook(request)).status).toBe(403);
		expect(await db().$count(smsStatuses, eq(smsStatuses.providerId, fields.MessageSid))).toBe(0);
	});
});
