import { and, eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { episodes, outbox, visits } from '$lib/server/db/schema';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { attendVisit, bookVisits, cancelVisit, missVisit, reopenVisit } from '$lib/server/visits/actions';
import { rescheduleVisit } from '$lib/server/visits/reschedule';
import { ScriptedChannel } from '../support/channels';
import { HOSPITAL_NOW, addPatient, addReferral, contextOf } from '../support/hospital';
import { DAY_MS, HOUR_MS } from '../support/lengths';
import { addVisit } from '../support/messages';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital({ PUBLIC_URL: 'https://ropewalk.saltmarsh.example' });
const staff = (now = HOSPITAL_NOW) => contextOf(hospital.people.coordinator, now);
const STARTS_AT = HOSPITAL_NOW + 2 * DAY_MS;

async function visitOf(change: Parameters<typeof addVisit>[1] = {}) {
	const { patient, episodeId } = await addPatient({ unitId: hospital.units.ward });
	const own = { ...hospital, patient, episodeId };
	return { own, patient, episodeId, id: await addVisit(own, { startsAt: STARTS_AT, ...change }) };
}

async function send(now: number) {
	const mail = new ScriptedChannel();
	await new OutboxWorker({ channels: { sms: new ScriptedChannel(), mail }, now: () => now }).settle();
	return mail.sent;
}

describe('a visit that was marked by mistake and is planned again', () => {
	it.each([
		['attended', attendVisit],
		['missed', missVisit]
	])('as %s tells of its move in the morning after all', async (_, mark) => {
		// At night, so that the text waits for 08:00.
		const night = HOSPITAL_NOW + 13 * HOUR_MS;
		const { id, patient } = await visitOf();
		await rescheduleVisit(staff(night), id, { startsAt: STARTS_AT + DAY_MS });
		await mark(staff(night + 1), id, 'The wrong row.');
		await reopenVisit(staff(night + 2), id, 'The wrong row.');
		await send(night + 11 * HOUR_MS);
		const news = and(eq(outbox.patientId, patient.id), eq(outbox.kind, 'visit'));
		expect(await db().select().from(outbox).where(news)).toMatchObject([{ state: 'accepted' }]);
	});

	it.each([
		['missed', 'wrong-state'],
		['cancelled', 'wrong-state']
	] as const)('as %s not after the stay and its visits are over', async (state, code) => {
		const { id, episodeId } = await visitOf({ state });
		await db()
			.update(episodes)
			.set({ closedAt: HOSPITAL_NOW, closedFor: 'other-hospital' })
			.where(eq(episodes.id, episodeId));
		await expect(reopenVisit(staff(), id, 'The wrong row.')).rejects.toMatchObject({ code });
	});

	it('finds its time taken by another visit of the patient', async () => {
		const { id, own } = await visitOf({ state: 'missed' });
		const other = await addVisit(own, { startsAt: STARTS_AT });
		await expect(reopenVisit(staff(), id, 'The wrong row.')).rejects.toMatchObject({
			code: 'visit-overlaps',
			message: expect.stringContaining('The visit stays as it was.'),
			extra: { other: { id: other } }
		});
		const [row] = await db().select().from(visits).where(eq(visits.id, id));
		expect(row?.state).toBe('missed');
	});

	it('is not in its own way, and a past one is put right whatever else was booked', async () => {
		const ahead = await visitOf({ state: 'attended' });
		await reopenVisit(staff(), ahead.id, 'The wrong row.');
		const past = await visitOf({ state: 'attended', startsAt: HOSPITAL_NOW });
		await addVisit(past.own, { startsAt: HOSPITAL_NOW });
		const { result } = await reopenVisit(staff(), past.id, 'The wrong row.');
		expect(result.state).toBe('planned');
	});
});

describe('the mail about a series to whoever referred', () => {
	it.each([
		[1, 'accepted'],
		[2, 'skipped']
	] as const)('with %d of two visits cancelled is %s', async (cancelled, state) => {
		const { episodeId } = await addPatient({ unitId: hospital.units.ward });
		await addReferral({ episodeId, askedBy: hospital.people.surgeon.id });
		const { result } = await bookVisits(staff(), episodeId, {
			kind: 'series',
			from: '2026-03-09',
			weekdays: ['mon', 'wed'],
			time: '10:00',
			count: 2,
			minutes: 45,
			place: 'East Gym'
		});
		for (const { id } of result.items.slice(0, cancelled)) {
			await cancelVisit(staff(), id, 'Away.');
		}
		await send(HOSPITAL_NOW + 1);
		const key = `visit-booked:${result.items[0]?.id}`;
		const [row] = await db().select().from(outbox).where(eq(outbox.causeKey, key));
		expect(row?.state).toBe(state);
	});
});
