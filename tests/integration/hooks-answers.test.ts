import { eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { audit, entries, inboundMessages, liveEvents, outbox } from '$lib/server/db/schema';
import { HOSPITAL_NOW, addPatient, addReferral } from '../support/hospital';
import { addReminder, addVisit, rowOf } from '../support/messages';
import { openHospital } from '../support/open-hospital';
import {
	PUBLIC_URL,
	answers,
	inbound,
	newSid,
	remind,
	remindedPatient,
	say,
	stateOf
} from '../support/patient-texts';

const HOUR = 60 * 60 * 1000;
const DAY = 24 * HOUR;

const hospital = await openHospital({ PUBLIC_URL });
const reminded = (change: Parameters<typeof addVisit>[1] = {}) => remindedPatient(hospital, change);

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

	it('to the newest text is thanked for, and is none to a visit that was told of before', async () => {
		const { own, patient, visitId } = await reminded({ startsAt: HOSPITAL_NOW + 3 * DAY });
		const newest = await addVisit(own, { state: 'confirmed' });
		await remind(newest, patient.id, HOSPITAL_NOW + HOUR + 1);
		const sid = newSid();
		await say(patient.phone, 'YES', sid, HOSPITAL_NOW + HOUR + 2);
		expect(await stateOf(visitId)).toBe('planned');
		expect(await inbound(sid)).toMatchObject({ visitId: newest });
		expect((await answers(sid))[0]?.body).toContain('see you');
	});

	it('said to each of two texts of one hour confirms both', async () => {
		const { own, patient, visitId } = await reminded({ startsAt: HOSPITAL_NOW + 3 * DAY });
		const newest = await addVisit(own);
		await remind(newest, patient.id, HOSPITAL_NOW + HOUR);
		await say(patient.phone, 'YES', newSid(), HOSPITAL_NOW + HOUR + 1);
		expect(await Promise.all([newest, visitId].map(stateOf))).toEqual(['confirmed', 'planned']);
		await say(patient.phone, 'YES', newSid(), HOSPITAL_NOW + HOUR + 2);
		expect(await stateOf(visitId)).toBe('confirmed');
	});

	it('to a time that has moved confirms no other visit', async () => {
		const { own, patient, visitId } = await reminded({ startsAt: HOSPITAL_NOW + 3 * DAY });
		const moved = await addVisit(own, { sequence: 1 });
		await remind(moved, patient.id, HOSPITAL_NOW + HOUR + 1);
		const sid = newSid();
		await say(patient.phone, 'YES', sid, HOSPITAL_NOW + HOUR + 2);
		expect(await Promise.all([moved, visitId].map(stateOf))).toEqual(['planned', 'planned']);
		expect((await answers(sid))[0]?.body).toContain('no visit is waiting');
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
			await remind(gone, patient.id, HOSPITAL_NOW + 1, { kind: 'visit' });
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

	it('after a HELP still answers the reminder before it', async () => {
		const { patient, visitId } = await reminded();
		const help = newSid();
		await say(patient.phone, 'HELP', help);
		await arrived(help);
		await say(patient.phone, 'Ok', newSid(), HOSPITAL_NOW + 2);
		expect(await stateOf(visitId)).toBe('confirmed');
	});

	it('after our thanks is not thanked for', async () => {
		const { patient } = await reminded();
		const [yes, ok] = [newSid(), newSid()];
		await say(patient.phone, 'YES', yes);
		await arrived(yes);
		await say(patient.phone, 'Ok', ok, HOSPITAL_NOW + 2);
		expect(await inbound(ok)).toMatchObject({ understoodAs: 'acknowledged', handledAt: HOSPITAL_NOW + 2 });
		expect(await answers(ok)).toEqual([]);
	});

	/** Our answer lies on the telephone. */
	async function arrived(sid: string): Promise<void> {
		const [answer] = await answers(sid);
		await db()
			.update(outbox)
			.set({ state: 'delivered', sentAt: HOSPITAL_NOW + 1, attempts: 1 })
			.where(eq(outbox.id, answer?.id ?? ''));
	}
});
