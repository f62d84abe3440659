import { eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { outbox, visits } from '$lib/server/db/schema';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { HOSPITAL_NOW, addPatient } from '../support/hospital';
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
