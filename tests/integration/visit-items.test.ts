import { describe, expect, it } from 'vitest';
import { eq } from 'drizzle-orm';
import { bookVisits } from '$lib/server/visits/actions';
import { listVisits, visitItemsOf } from '$lib/server/visits/queries';
import { db } from '$lib/server/db';
import { inboundMessages, outbox, visits } from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';
import { addPatient, contextOf, HOSPITAL_NOW } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const HOUR = 60 * 60 * 1000;
const DAY = 24 * HOUR;

const hospital = await openHospital();

let hours = 0;

/** A visit in three days, an hour after the one before: nobody can be in two at once. */
async function book(episodeId = hospital.episodeId) {
	const startsAt = HOSPITAL_NOW + 3 * DAY + hours * HOUR;
	hours += 1;
	const context = contextOf(hospital.people.coordinator);
	const input = { kind: 'single', startsAt, minutes: 45, place: 'East Gym' } as const;
	const { result } = await bookVisits(context, episodeId, input);
	return result.items[0]?.id ?? '';
}

async function answer(visitId: string, understoodAs: string, at: number): Promise<void> {
	await db().insert(inboundMessages).values({
		id: newId(),
		providerId: newId(),
		fromNumber: hospital.patient.phone,
		body: understoodAs,
		at,
		patientId: hospital.patient.id,
		understoodAs,
		visitId
	});
}

const itemOf = async (id: string) =>
	(await visitItemsOf(hospital.people.nurse, hospital.episodeId)).items.find((item) => item.id === id);

describe('the visits of one patient', () => {
	it('name the patient, the place and when each reminder goes', async () => {
		const item = await itemOf(await book());
		expect(item).toMatchObject({ place: 'East Gym', state: 'planned', answer: null, seriesId: null });
		expect(item?.patient).toMatchObject({ name: hospital.patient.name, birthDate: '1958-09-05' });
		// Two days and one day before a visit on Friday at 09:00: at 17:00 in Dublin.
		expect(item?.reminders.map(({ dueAt, state }) => [dueAt, state])).toEqual([
			['2026-03-04T17:00:00.000Z', 'ready'],
			['2026-03-05T17:00:00.000Z', 'ready']
		]);
	});

	it('follow what becomes of a reminder', async () => {
		const id = await book();
		await db()
			.update(outbox)
			.set({ state: 'skipped', stateReason: 'no consent', sentAt: null })
			.where(eq(outbox.refId, id));
		expect((await itemOf(id))?.reminders[0]).toMatchObject({ state: 'skipped', reason: 'no consent' });
	});

	it('keep the last answer, and no other word', async () => {
		const id = await book();
		await answer(id, 'yes', HOSPITAL_NOW + HOUR);
		await answer(id, 'no', HOSPITAL_NOW + 2 * HOUR);
		await answer(id, 'other', HOSPITAL_NOW + 3 * HOUR);
		expect((await itemOf(id))?.answer).toEqual({ at: '2026-03-03T11:00:00.000Z', yes: false });
	});

	it('leave out the visits of others', async () => {
		const other = await addPatient({ unitId: hospital.units.ward, bed: '5' });
		const id = await book(other.episodeId);
		expect(await itemOf(id)).toBeUndefined();
		const week = { from: HOSPITAL_NOW, to: HOSPITAL_NOW + 7 * DAY };
		const all = (await listVisits(hospital.people.nurse, week)).items;
		expect(all.map((item) => item.id)).toContain(id);
	});

	it('are not there for an outsider, and not for an administrator', async () => {
		const { episodeId } = hospital;
		await expect(visitItemsOf(hospital.outsider, episodeId)).rejects.toMatchObject({ code: 'not-found' });
		await expect(visitItemsOf(hospital.people.admin, episodeId)).rejects.toMatchObject({
			code: 'not-allowed'
		});
	});

	it('say that a visit the patient cancelled wants another time', async () => {
		const id = await book();
		await db().update(visits).set({ patientCancelledAt: HOSPITAL_NOW }).where(eq(visits.id, id));
		expect((await itemOf(id))?.wantsFollowUp).toBe(true);
	});
});
