import { eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { outbox, visits } from '$lib/server/db/schema';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { cancelVisit } from '$lib/server/visits/actions';
import { rescheduleVisit } from '$lib/server/visits/reschedule';
import { newsKey } from '$lib/server/visits/tell-patient';
import { HOSPITAL_NOW, addPatient, contextOf } from '../support/hospital';
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
		await remind(later, patient.id, HOSPITAL_NOW + apart);
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

describe('NO, where an older visit was told of too', () => {
	/** Told of longer ago than an hour: nothing that is said now is about it. */
	const LONG_AGO = HOSPITAL_NOW - HOUR - 1;

	/** A visit of tomorrow that the newest text tells of, and a later one that was told of before and must stay. */
	async function twoTold(change: Parameters<typeof addVisit>[1] = {}) {
		const { patient, episodeId } = await addPatient({ unitId: hospital.units.ward });
		const own = { ...hospital, patient, episodeId };
		const older = await addVisit(own, { startsAt: HOSPITAL_NOW + 3 * DAY });
		await remind(older, patient.id, LONG_AGO);
		const newest = await addVisit(own, change);
		await remind(newest, patient.id);
		return { patient, older, newest };
	}

	async function isLeftToPerson(sid: string) {
		const row = await inbound(sid);
		expect(row).toMatchObject({ understoodAs: 'no', handledAt: null, visitId: null });
		const { mine } = await looseEndsOf(db(), hospital.people.coordinator, HOSPITAL_NOW + 2);
		expect(mine.filter(({ kind, id }) => kind === 'inbound' && id === row?.id)).toHaveLength(1);
		expect((await answers(sid)).map(({ body }) => body)).toEqual([
			expect.stringContaining('A person will read')
		]);
	}

	it('said twice is heard twice and cancels one visit', async () => {
		const { patient, older, newest } = await twoTold();
		const again = newSid();
		await say(patient.phone, 'No', newSid(), HOSPITAL_NOW + 1);
		await say(patient.phone, 'No thanks', again, HOSPITAL_NOW + 2);
		expect(await Promise.all([newest, older].map(stateOf))).toEqual(['cancelled', 'planned']);
		expect(await inbound(again)).toMatchObject({ visitId: newest, handledAt: HOSPITAL_NOW + 2 });
		expect((await answers(again)).map(({ body }) => body)).toEqual([
			expect.stringContaining('is cancelled. We will call')
		]);
	});

	it('to the news that staff cancelled the newest', async () => {
		const { patient, older, newest } = await twoTold();
		await cancelVisit(contextOf(hospital.people.coordinator), newest, 'Therapist away.');
		await remind(newest, patient.id, HOSPITAL_NOW + 1, { kind: 'visit' });
		const sid = newSid();
		await say(patient.phone, 'no', sid, HOSPITAL_NOW + 2);
		expect(await Promise.all([newest, older].map(stateOf))).toEqual(['cancelled', 'planned']);
		await isLeftToPerson(sid);
	});

	it('to the news that all visits of a stay are cancelled', async () => {
		const { patient, older, newest } = await twoTold({ state: 'cancelled' });
		const { episodeId } = await addPatient({ unitId: hospital.units.ward });
		await remind(newest, patient.id, HOSPITAL_NOW + HOUR + 1, {
			kind: 'visit',
			ref: { kind: 'episode', id: episodeId }
		});
		const sid = newSid();
		await say(patient.phone, 'no', sid, HOSPITAL_NOW + HOUR + 2);
		expect(await stateOf(older)).toBe('planned');
		await isLeftToPerson(sid);
	});

	it('to a time that has moved, while the text of the new one waits for the morning', async () => {
		const { patient, older, newest } = await twoTold();
		const evening = HOSPITAL_NOW + 12 * HOUR;
		const { result } = await rescheduleVisit(contextOf(hospital.people.coordinator, evening), newest, {
			startsAt: HOSPITAL_NOW + 2 * DAY
		});
		const [news] = await db()
			.select()
			.from(outbox)
			.where(eq(outbox.causeKey, newsKey(result, 'sms')));
		expect(news?.nextAt).toBeGreaterThan(evening);
		const sid = newSid();
		await say(patient.phone, 'No', sid, evening + 1);
		expect(await Promise.all([newest, older].map(stateOf))).toEqual(['planned', 'planned']);
		await isLeftToPerson(sid);
	});

	it('to a visit that has begun', async () => {
		const { patient, older } = await twoTold({ startsAt: HOSPITAL_NOW + 1 });
		const sid = newSid();
		await say(patient.phone, 'No', sid, HOSPITAL_NOW + 1);
		expect(await stateOf(older)).toBe('planned');
		await isLeftToPerson(sid);
	});
});
