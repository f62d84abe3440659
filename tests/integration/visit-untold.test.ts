import { eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { outbox, patients, visits } from '$lib/server/db/schema';
import { closeEpisode } from '$lib/server/episodes/close';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { cancelVisit, confirmVisit } from '$lib/server/visits/actions';
import { rescheduleVisit } from '$lib/server/visits/reschedule';
import { getUntoldVisit, tellInPerson } from '$lib/server/visits/tell-in-person';
import { UNTOLD_AFTER_MS } from '$lib/server/visits/untold';
import { ScriptedChannel, permanent } from '../support/channels';
import { HOSPITAL_NOW, addPatient, contextOf } from '../support/hospital';
import { DAY_MS, HOUR_MS } from '../support/lengths';
import { addVisit } from '../support/messages';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
const { coordinator, nurse } = hospital.people;
const STARTS_AT = HOSPITAL_NOW + DAY_MS;

/** A patient of their own with a visit tomorrow. */
async function visitOf(contact: Partial<typeof patients.$inferInsert> = {}, startsAt = STARTS_AT) {
	const { patient, episodeId } = await addPatient({ unitId: hospital.units.ward });
	await db()
		.update(patients)
		.set({ zone: 'Europe/Dublin', ...contact })
		.where(eq(patients.id, patient.id));
	const id = await addVisit({ ...hospital, patient, episodeId }, { startsAt });
	return { id, patient, episodeId };
}

async function isOpen(id: string, now = HOSPITAL_NOW): Promise<boolean> {
	const { mine } = await looseEndsOf(db(), coordinator, now);
	return mine.some((end) => end.kind === 'visit-untold' && end.id === id);
}

async function failures(now = HOSPITAL_NOW): Promise<number> {
	const { mine } = await looseEndsOf(db(), coordinator, now);
	return mine.filter(({ kind }) => kind === 'message-failed').length;
}

const cancel = (id: string, now = HOSPITAL_NOW) => cancelVisit(contextOf(coordinator, now), id, 'Away.');
const move = (id: string, days: number, now = HOSPITAL_NOW) =>
	rescheduleVisit(contextOf(coordinator, now), id, { startsAt: STARTS_AT + days * DAY_MS });
const send = (now = HOSPITAL_NOW, sms = new ScriptedChannel()) =>
	new OutboxWorker({ channels: { sms, mail: new ScriptedChannel() }, now: () => now }).settle();

describe.each([
	['cancelled', cancel],
	['moved', (id: string, now?: number) => move(id, 2, now)]
] as const)('a visit that was %s', (_, change) => {
	it('of which nothing could be written is a loose end until a person has told the patient', async () => {
		const { id } = await visitOf({ smsOptedOutAt: HOSPITAL_NOW - 1 });
		expect(await isOpen(id)).toBe(false);
		await change(id);
		expect(await isOpen(id)).toBe(true);
		expect((await getUntoldVisit(coordinator, id, HOSPITAL_NOW)).settled).toBe(false);
		await expect(tellInPerson(contextOf(nurse), id)).rejects.toMatchObject({ code: 'not-allowed' });
		await tellInPerson(contextOf(coordinator), id);
		expect(await isOpen(id)).toBe(false);
		expect((await getUntoldVisit(coordinator, id, HOSPITAL_NOW)).settled).toBe(true);
		await expect(tellInPerson(contextOf(coordinator), id)).rejects.toMatchObject({ code: 'wrong-state' });
	});

	it('waits for its text, and is none once that has gone', async () => {
		const { id } = await visitOf();
		await change(id);
		expect(await isOpen(id)).toBe(false);
		await send();
		expect(await isOpen(id)).toBe(false);
	});

	it.each([
		['a STOP', { smsOptedOutAt: HOSPITAL_NOW }],
		['withdrawn consent', { smsConsent: false }],
		['a number that was removed', { phone: null }]
	])('is one after %s came before the text', async (_why, contact) => {
		const { id, patient } = await visitOf();
		await change(id);
		await db().update(patients).set(contact).where(eq(patients.id, patient.id));
		await send();
		expect(await isOpen(id)).toBe(true);
	});

	it('is one thing and not two where its text failed', async () => {
		const { id } = await visitOf();
		const before = await failures();
		await change(id);
		const sms = new ScriptedChannel();
		sms.script = [permanent('refused')];
		await send(HOSPITAL_NOW, sms);
		expect(await isOpen(id)).toBe(true);
		expect(await failures()).toBe(before);
		await tellInPerson(contextOf(coordinator), id);
		expect(await failures()).toBe(before);
	});

	it('is none where the mail went and the text did not', async () => {
		const { id } = await visitOf({
			smsConsent: false,
			email: 'patient@saltmarsh.example',
			mailConsent: true
		});
		await change(id);
		await send();
		expect(await isOpen(id)).toBe(false);
	});

	it.each([
		[STARTS_AT, true],
		[STARTS_AT + UNTOLD_AFTER_MS - 1, true],
		[STARTS_AT + UNTOLD_AFTER_MS, false]
	])('is said until a day after the time that the patient knew of: at %d %s', async (at, open) => {
		const { id } = await visitOf({ smsConsent: false });
		await change(id);
		expect(await isOpen(id, at)).toBe(open);
	});
});

it('a text that could only wait until it is too late fails at once', async () => {
	// 19:59 in Dublin; the visit is at 07:00, before anybody may be written to.
	const evening = Date.parse('2026-03-03T19:59:00Z');
	const { id, patient } = await visitOf({}, Date.parse('2026-03-04T07:00:00Z'));
	await cancel(id, evening);
	await send(evening + HOUR_MS);
	const rows = await db().select().from(outbox).where(eq(outbox.patientId, patient.id));
	expect(rows.map(({ state, stateReason }) => [state, stateReason])).toEqual([['failed', 'expired']]);
	expect(await isOpen(id, evening + HOUR_MS)).toBe(true);
});

it('of two moves of which none was told, the patient still expects the first time', async () => {
	const { id } = await visitOf({ smsConsent: false });
	await move(id, 1);
	await move(id, 3, HOSPITAL_NOW + 1);
	const [row] = await db().select().from(visits).where(eq(visits.id, id));
	expect(row?.changedFrom).toBe(STARTS_AT);
});

it('of two moves of which the first was told, the patient expects the time of that', async () => {
	const { id } = await visitOf();
	await move(id, 1);
	await send();
	await move(id, 3, HOSPITAL_NOW + 1);
	const [row] = await db().select().from(visits).where(eq(visits.id, id));
	expect(row?.changedFrom).toBe(STARTS_AT + DAY_MS);
});

it('a patient who is called and says yes has heard of the new time', async () => {
	const { id } = await visitOf({ smsConsent: false });
	await move(id, 1);
	await confirmVisit(contextOf(coordinator), id);
	expect(await isOpen(id)).toBe(false);
});

it('a cancellation of what is past is nobody’s to tell', async () => {
	const { id } = await visitOf({ smsConsent: false }, HOSPITAL_NOW);
	await cancel(id);
	expect(await isOpen(id)).toBe(false);
});

it.each([
	['other-hospital', 1],
	['died', 0]
] as const)('the end of a stay, %s, is to be told once for all of its visits', async (reason, count) => {
	const { patient, episodeId, id } = await visitOf({ smsConsent: false });
	const more = await addVisit({ ...hospital, patient, episodeId }, { startsAt: STARTS_AT + DAY_MS });
	await closeEpisode(contextOf(hospital.people.physician), episodeId, reason);
	expect([await isOpen(id), await isOpen(more)].filter(Boolean)).toHaveLength(count);
});
