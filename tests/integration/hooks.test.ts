import { randomBytes } from 'node:crypto';
import { and, asc, desc, eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import type { VisitState } from '$lib/domain/core/codes';
import { db } from '$lib/server/db';
import {
	audit,
	entries,
	inboundMessages,
	liveEvents,
	outbox,
	patients,
	smsStatuses,
	visits
} from '$lib/server/db/schema';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { ScriptedChannel, accepted } from '../support/channels';
import { callHook, signedPost } from '../support/hook-server';
import { HOSPITAL_NOW, addPatient, addPerson, addReferral, newPhone } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { addReminder, addVisit, rowOf } from '../support/messages';

const PUBLIC_URL = 'https://ropewalk.saltmarsh.example';
const HOUR = 60 * 60 * 1000;
const DAY = 24 * HOUR;

const hospital = await openHospital({ PUBLIC_URL });

const newSid = () => `SM${randomBytes(16).toString('hex')}`;
const text = (From: string, Body: string, MessageSid = newSid()) => ({
	AccountSid: `AC${'0'.repeat(32)}`,
	From,
	To: '+353860000000',
	Body,
	MessageSid
});

async function say(from: string, body: string, sid = newSid(), now = HOSPITAL_NOW): Promise<Response> {
	return callHook(signedPost(PUBLIC_URL, '/api/hooks/sms', text(from, body, sid)), now);
}

async function inbound(sid: string) {
	const [row] = await db().select().from(inboundMessages).where(eq(inboundMessages.providerId, sid));
	return row;
}

async function answers(sid: string) {
	const row = await inbound(sid);
	return db()
		.select()
		.from(outbox)
		.where(and(eq(outbox.kind, 'answer'), eq(outbox.refId, row?.id ?? '')));
}

/** A patient of their own with one visit that was reminded of. */
async function reminded(change: Parameters<typeof addVisit>[1] = {}) {
	const { patient, episodeId } = await addPatient({ unitId: hospital.units.ward });
	const own = { ...hospital, patient, episodeId };
	const visitId = await addVisit(own, change);
	await remind(visitId, patient.id);
	return { own, patient, episodeId, visitId };
}

async function remind(visitId: string, patientId: string): Promise<string> {
	const id = await addReminder(visitId, patientId);
	await db()
		.update(outbox)
		.set({ state: 'delivered', sentAt: HOSPITAL_NOW, attempts: 1 })
		.where(eq(outbox.id, id));
	return id;
}

async function stateOf(visitId: string): Promise<VisitState | undefined> {
	const [row] = await db().select().from(visits).where(eq(visits.id, visitId));
	return row?.state;
}

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

describe('YES', () => {
	it('confirms the next reminded visit, in the thread, the audit and the stream', async () => {
		const { own, patient, episodeId, visitId } = await reminded();
		const { threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id });
		const later = await addVisit(own, { startsAt: HOSPITAL_NOW + 3 * DAY });
		await remind(later, patient.id);
		const sid = newSid();
		expect((await say(patient.phone, ' Yes, thanks! ', sid)).status).toBe(200);
		expect(await stateOf(visitId)).toBe('confirmed');
		expect(await stateOf(later)).toBe('planned');
		expect(await inbound(sid)).toMatchObject({
			patientId: patient.id,
			understoodAs: 'yes',
			visitId,
			handledAt: HOSPITAL_NOW
		});
		const [entry] = await db().select().from(entries).where(eq(entries.threadId, threadId));
		expect(entry).toMatchObject({ kind: 'event', strand: 'patient', authorId: null, refId: visitId });
		const rows = await db().select().from(audit).where(eq(audit.episodeId, episodeId));
		expect(rows.map(({ action, actorKind, actorId }) => [action, actorKind, actorId])).toEqual([
			['message.received', 'patient', patient.id],
			['visit.confirmed', 'patient', patient.id]
		]);
		const events = await db().select().from(liveEvents).where(eq(liveEvents.episodeId, episodeId));
		expect(events.map(({ topic, kind }) => `${topic} ${kind}`)).toEqual(
			expect.arrayContaining(['message received', 'visit confirmed', 'thread entry'])
		);
		expect(await answers(sid)).toMatchObject([{ patientId: patient.id, state: 'ready' }]);
	});

	it('confirms nothing that the patient was not reminded of yet', async () => {
		const { patient, episodeId } = await addPatient({ unitId: hospital.units.ward });
		const visitId = await addVisit({ ...hospital, episodeId });
		await addReminder(visitId, patient.id, { notBefore: HOSPITAL_NOW + HOUR });
		await say(patient.phone, 'YES');
		expect(await stateOf(visitId)).toBe('planned');
	});

	it('rewords the reminders that are still to come', async () => {
		const { patient, visitId } = await reminded();
		const next = await addReminder(visitId, patient.id, { notBefore: HOSPITAL_NOW + HOUR });
		await say(patient.phone, 'YES');
		const { state, body } = await rowOf(next);
		expect(state).toBe('ready');
		expect(body).toContain('Reply NO if you cannot come');
	});

	it('said again is thanked again and moves no other visit', async () => {
		const { own, patient, visitId } = await reminded();
		const notReminded = await addVisit(own, { startsAt: HOSPITAL_NOW + 2 * DAY });
		await say(patient.phone, 'YES');
		const sid = newSid();
		await say(patient.phone, 'YES', sid);
		expect(await stateOf(visitId)).toBe('confirmed');
		expect(await stateOf(notReminded)).toBe('planned');
		expect(await inbound(sid)).toMatchObject({ visitId, understoodAs: 'yes' });
		expect((await answers(sid))[0]?.body).toContain('see you');
	});

	it.each([
		['a visit that has begun', { startsAt: HOSPITAL_NOW }],
		['a cancelled one', { state: 'cancelled' as const }]
	])('confirms nothing for %s', async (_, change) => {
		const { patient, visitId } = await reminded(change);
		const before = await stateOf(visitId);
		const sid = newSid();
		await say(patient.phone, 'YES', sid);
		expect(await stateOf(visitId)).toBe(before);
		expect(await inbound(sid)).toMatchObject({ visitId: null });
		expect((await answers(sid))[0]?.body).toContain('no visit is waiting');
	});

	it('posted a hundred times, many at once, has one effect', async () => {
		const { patient, episodeId, visitId } = await reminded();
		const sid = newSid();
		const all = await Promise.all(Array.from({ length: 100 }, () => say(patient.phone, 'YES', sid)));
		expect(new Set(all.map(({ status }) => status))).toEqual(new Set([200]));
		expect(await stateOf(visitId)).toBe('confirmed');
		expect(await db().$count(inboundMessages, eq(inboundMessages.providerId, sid))).toBe(1);
		expect(await db().$count(audit, eq(audit.episodeId, episodeId))).toBe(2);
		expect(await answers(sid)).toHaveLength(1);
	});
});

describe('NO', () => {
	it('cancels, drops the reminders to come, and is a loose end of the coordinator until followed up', async () => {
		const { patient, visitId } = await reminded({ state: 'confirmed' });
		const next = await addReminder(visitId, patient.id, { notBefore: HOSPITAL_NOW + HOUR });
		const sid = newSid();
		await say(patient.phone, 'No, sorry', sid);
		const [visit] = await db().select().from(visits).where(eq(visits.id, visitId));
		expect(visit).toMatchObject({
			state: 'cancelled',
			patientCancelledAt: HOSPITAL_NOW,
			followedUpAt: null,
			decidedAt: HOSPITAL_NOW
		});
		expect(await rowOf(next)).toMatchObject({ state: 'cancelled', stateReason: 'visit cancelled' });
		expect(await inbound(sid)).toMatchObject({ understoodAs: 'no', visitId });
		const { mine } = await looseEndsOf(db(), hospital.people.coordinator, HOSPITAL_NOW);
		expect(mine).toContainEqual(expect.objectContaining({ kind: 'visit-cancelled', id: visitId }));
		expect((await answers(sid))[0]?.body).toContain('cancelled');
	});

	/** A second visit of the same patient, whose reminder was sent so long after that of the first. */
	async function twoReminded(apart: number) {
		const { own, patient, visitId } = await reminded({ state: 'confirmed' });
		const later = await addVisit(own, { startsAt: HOSPITAL_NOW + 3 * DAY });
		const newest = await remind(later, patient.id);
		await db()
			.update(outbox)
			.set({ sentAt: HOSPITAL_NOW + apart })
			.where(eq(outbox.id, newest));
		return { patient, states: async () => [await stateOf(visitId), await stateOf(later)] };
	}

	it('is to the visit that the newest text told of, not to the next one', async () => {
		const { patient, states } = await twoReminded(HOUR + 1);
		await say(patient.phone, 'No', newSid(), HOSPITAL_NOW + HOUR + 2);
		expect(await states()).toEqual(['confirmed', 'cancelled']);
	});

	// That texts within an hour are read together: common practice, no published source.
	it.each([0, 1, HOUR - 1, HOUR])(
		'to two visits that were told of %d ms apart is neither: a person asks which',
		async (apart) => {
			const { patient, states } = await twoReminded(apart);
			const sid = newSid();
			await say(patient.phone, 'No', sid, HOSPITAL_NOW + HOUR + 2);
			expect(await states()).toEqual(['confirmed', 'planned']);
			const row = await inbound(sid);
			expect(row).toMatchObject({ understoodAs: 'no', handledAt: null, visitId: null });
			const { mine } = await looseEndsOf(db(), hospital.people.coordinator, HOSPITAL_NOW + 2 * HOUR);
			expect(mine).toContainEqual(expect.objectContaining({ kind: 'inbound', id: row?.id }));
			expect((await answers(sid))[0]?.body).toContain('A person will read');
		}
	);

	it('stays a loose end when the time of the visit comes, and after it', async () => {
		const { patient, visitId } = await reminded();
		await say(patient.phone, 'No');
		const startsAt = HOSPITAL_NOW + DAY;
		for (const now of [startsAt - 1, startsAt, startsAt + 1]) {
			const { mine } = await looseEndsOf(db(), hospital.people.coordinator, now);
			expect(mine).toContainEqual(expect.objectContaining({ kind: 'visit-cancelled', id: visitId }));
		}
	});

	it('without a reminded visit is left to a person', async () => {
		const { patient } = await addPatient({ unitId: hospital.units.ward });
		const sid = newSid();
		await say(patient.phone, 'NO', sid);
		const row = await inbound(sid);
		expect(row).toMatchObject({ understoodAs: 'no', handledAt: null });
		const { mine } = await looseEndsOf(db(), hospital.people.coordinator, HOSPITAL_NOW);
		expect(mine).toContainEqual(expect.objectContaining({ kind: 'inbound', id: row?.id }));
	});
});

describe('a bare Ok', () => {
	it.each(['Ok', 'vale', '👍'])('%s to a reminder is a yes', async (body) => {
		const { patient, visitId } = await reminded();
		await say(patient.phone, body);
		expect(await stateOf(visitId)).toBe('confirmed');
	});

	it.each(['Ok', 'vale', '👍'])(
		'%s to the news that another visit is cancelled confirms nothing',
		async (body) => {
			const { own, patient, visitId } = await reminded();
			const gone = await addVisit(own, { startsAt: HOSPITAL_NOW + 2 * DAY, state: 'cancelled' });
			const news = await addReminder(gone, patient.id, { kind: 'visit' });
			await db()
				.update(outbox)
				.set({ state: 'delivered', sentAt: HOSPITAL_NOW + 1, attempts: 1 })
				.where(eq(outbox.id, news));
			const sid = newSid();
			await say(patient.phone, body, sid, HOSPITAL_NOW + 2);
			expect(await stateOf(visitId)).toBe('planned');
			expect(await inbound(sid)).toMatchObject({
				understoodAs: 'acknowledged',
				visitId: null,
				handledAt: HOSPITAL_NOW + 2
			});
			expect(await answers(sid)).toEqual([]);
			// A yes in words is one, whatever was written last.
			await say(patient.phone, 'Yes', newSid(), HOSPITAL_NOW + 3);
			expect(await stateOf(visitId)).toBe('confirmed');
		}
	);
});

describe('STOP, START and HELP', () => {
	const consentOf = async (id: string) => {
		const [row] = await db().select().from(patients).where(eq(patients.id, id));
		return [row?.smsOptedOutAt, row?.smsConsent];
	};

	it('STOP is kept at once, START takes it back', async () => {
		const { patient } = await reminded();
		const stop = newSid();
		await say(patient.phone, 'STOP', stop);
		await say(patient.phone, 'Stop', newSid(), HOSPITAL_NOW + HOUR);
		expect(await consentOf(patient.id)).toEqual([HOSPITAL_NOW, true]);
		expect(await answers(stop)).toEqual([]);
		const start = newSid();
		await say(patient.phone, 'START', start);
		expect(await consentOf(patient.id)).toEqual([null, true]);
		expect(await answers(start)).toHaveLength(1);
	});

	it('START brings the reminders back too', async () => {
		const { patient, visitId } = await reminded();
		await say(patient.phone, 'STOP');
		await say(patient.phone, ' start ', newSid(), HOSPITAL_NOW + HOUR);
		const next = await addReminder(visitId, patient.id);
		await new OutboxWorker({
			channels: { sms: new ScriptedChannel(), mail: null },
			now: () => HOSPITAL_NOW + HOUR
		}).settle();
		expect((await rowOf(next)).state).toBe('accepted');
	});

	it('STOP in words of their own is confirmed once, by us, because the gateway does not know them', async () => {
		const { patient } = await reminded();
		await db().update(outbox).set({ state: 'cancelled' }).where(eq(outbox.state, 'ready'));
		const sms = new ScriptedChannel();
		const send = async (now: number) =>
			new OutboxWorker({ channels: { sms, mail: null }, now: () => now }).settle();
		await say(patient.phone, 'please stop these texts');
		await send(HOSPITAL_NOW);
		await say(patient.phone, 'I said no more texts', newSid(), HOSPITAL_NOW + 1);
		await say(patient.phone, 'remove me', newSid(), HOSPITAL_NOW + HOUR);
		await send(HOSPITAL_NOW + HOUR);
		expect(sms.sent.map(({ body }) => body)).toEqual([
			'Saltmarsh General: no more texts will come. START brings them back. Questions: +353 1 555 0100.'
		]);
		expect(await consentOf(patient.id)).toEqual([HOSPITAL_NOW, true]);
	});

	it('nothing goes out after STOP, not even an answer', async () => {
		const { patient, visitId } = await reminded();
		const next = await addReminder(visitId, patient.id);
		await say(patient.phone, 'STOP');
		const sid = newSid();
		await say(patient.phone, 'HELP', sid);
		const sms = new ScriptedChannel();
		await new OutboxWorker({ channels: { sms, mail: null }, now: () => HOSPITAL_NOW }).settle();
		expect(sms.sent.filter(({ to }) => to === patient.phone)).toEqual([]);
		expect(await rowOf(next)).toMatchObject({ state: 'skipped', stateReason: 'opted out' });
		expect(await answers(sid)).toMatchObject([{ state: 'skipped', stateReason: 'opted out' }]);
	});

	it('HELP says whom to call', async () => {
		const { patient } = await addPatient({ unitId: hospital.units.ward });
		const sid = newSid();
		await say(patient.phone, 'help', sid);
		const [answer] = await answers(sid);
		expect(answer?.body).toContain('+353 1 555 0100');
		expect(answer?.body).toContain('112');
	});
});

describe('anything else', () => {
	it('is kept for a person, and answered once in twelve hours', async () => {
		const { patient } = await addPatient({ unitId: hospital.units.ward });
		const [first, second, third] = [newSid(), newSid(), newSid()];
		const start = Math.ceil(HOSPITAL_NOW / (12 * HOUR)) * 12 * HOUR;
		await say(patient.phone, 'My leg is swollen', first, start);
		await say(patient.phone, 'Are you there?', second, start + 12 * HOUR - 1);
		await say(patient.phone, 'Hello?', third, start + 12 * HOUR);
		expect(await inbound(first)).toMatchObject({
			understoodAs: 'other',
			handledAt: null,
			body: 'My leg is swollen'
		});
		const counts = await Promise.all([first, second, third].map(async (sid) => (await answers(sid)).length));
		expect(counts).toEqual([1, 0, 1]);
	});

	it('stores an empty text and cuts an endless one', async () => {
		const { patient } = await addPatient({ unitId: hospital.units.ward });
		const [empty, long] = [newSid(), newSid()];
		await say(patient.phone, '', empty);
		await say(patient.phone, 'x'.repeat(5_000), long);
		expect((await inbound(empty))?.body).toBe('');
		expect((await inbound(long))?.body).toHaveLength(2_000);
	});
});

describe('numbers that are nobody’s or two people’s', () => {
	it('an unknown number is parked, unanswered, and every coordinator hears of it', async () => {
		const number = newPhone();
		const sid = newSid();
		await say(number, 'YES', sid);
		const row = await inbound(sid);
		expect(row).toMatchObject({
			fromNumber: number,
			patientId: null,
			understoodAs: 'unknown-number',
			handledAt: null
		});
		expect(await answers(sid)).toEqual([]);
		expect(await db().$count(outbox, eq(outbox.address, number))).toBe(0);
		const events = await db()
			.select()
			.from(liveEvents)
			.where(eq(liveEvents.subjectId, row?.id ?? ''));
		expect(events.map(({ userId }) => userId)).toEqual([hospital.people.coordinator.id]);
		const { mine } = await looseEndsOf(db(), hospital.people.coordinator, HOSPITAL_NOW);
		expect(mine).toContainEqual(expect.objectContaining({ kind: 'inbound', id: row?.id, patientName: null }));
	});

	it('a number of two patients files nothing, answers nothing, and obeys STOP for both', async () => {
		const { patient, visitId } = await reminded();
		const twin = await addPatient({ unitId: hospital.units.ward, phone: patient.phone });
		const [yes, stop] = [newSid(), newSid()];
		await say(patient.phone, 'YES', yes);
		await say(patient.phone, 'STOP', stop);
		expect(await stateOf(visitId)).toBe('planned');
		expect(await inbound(yes)).toMatchObject({
			understoodAs: 'shared-number',
			patientId: null,
			handledAt: null
		});
		expect([...(await answers(yes)), ...(await answers(stop))]).toEqual([]);
		for (const id of [patient.id, twin.patient.id]) {
			const [row] = await db().select().from(patients).where(eq(patients.id, id));
			expect(row?.smsOptedOutAt).toBe(HOSPITAL_NOW);
		}
	});

	it('a number of a patient who is staff too is parked', async () => {
		const { patient } = await addPatient({ unitId: hospital.units.ward });
		await addPerson({ role: 'nurse', unitIds: [hospital.units.ward], phone: patient.phone });
		const sid = newSid();
		await say(patient.phone, 'NO', sid);
		expect(await inbound(sid)).toMatchObject({ understoodAs: 'shared-number', userId: null });
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
