import { and, eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { audit, liveEvents, outbox, patientAmendments, patients } from '$lib/server/db/schema';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { amendContact } from '$lib/server/episodes/patient';
import { consentByText } from '$lib/server/messages/consent';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { ScriptedChannel } from '../support/channels';
import { HOSPITAL_NOW, contextOf, addPatient, addPerson, newPhone } from '../support/hospital';
import { addReminder, rowOf, type addVisit } from '../support/messages';
import { openHospital } from '../support/open-hospital';
import {
	PUBLIC_URL,
	answers,
	inbound,
	newSid,
	remindedPatient,
	say,
	stateOf
} from '../support/patient-texts';

const HOUR = 60 * 60 * 1000;

const hospital = await openHospital({ PUBLIC_URL });
const reminded = (change: Parameters<typeof addVisit>[1] = {}) => remindedPatient(hospital, change);

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

	it('START where no consent was on record amends it, by the patient and nobody of staff', async () => {
		const { patient, episodeId } = await reminded();
		await db().update(patients).set({ smsConsent: false }).where(eq(patients.id, patient.id));
		expect(await consentByText(episodeId)).toBeNull();
		await say(patient.phone, 'START');
		await say(patient.phone, 'START', newSid(), HOSPITAL_NOW + HOUR);
		const kept = await db()
			.select()
			.from(patientAmendments)
			.where(eq(patientAmendments.patientId, patient.id));
		expect(kept).toMatchObject([
			{ at: HOSPITAL_NOW, byId: null, field: 'smsConsent', before: 'false', after: 'true' }
		]);
		const rows = await db()
			.select()
			.from(audit)
			.where(and(eq(audit.objectId, patient.id), eq(audit.action, 'patient.amended')));
		expect(rows).toMatchObject([{ actorKind: 'patient', actorId: patient.id }]);
		expect(await consentByText(episodeId)).toBe('2026-03-03T09:00:00.000Z');
		const { coordinator } = hospital.people;
		await amendContact(contextOf(coordinator, HOSPITAL_NOW + 1), episodeId, { smsConsent: false });
		await amendContact(contextOf(coordinator, HOSPITAL_NOW + 2), episodeId, { smsConsent: true });
		expect(await consentByText(episodeId)).toBeNull();
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

	it.each(['CANCEL', 'cancel, thanks'])(
		'%s ends the texts, and is left to a person too where a visit was told of',
		async (body) => {
			const { patient, visitId } = await reminded();
			const sid = newSid();
			await say(patient.phone, body, sid);
			expect(await consentOf(patient.id)).toEqual([HOSPITAL_NOW, true]);
			expect(await stateOf(visitId)).toBe('planned');
			expect(await inbound(sid)).toMatchObject({ understoodAs: 'stop', handledAt: null });
		}
	);

	it.each([
		['CANCEL', 'cancelled'],
		['STOP', 'planned']
	] as const)('%s with a visit that is %s is a STOP and nothing else', async (body, state) => {
		const { patient } = await reminded({ state });
		const sid = newSid();
		await say(patient.phone, body, sid);
		expect(await consentOf(patient.id)).toEqual([HOSPITAL_NOW, true]);
		expect(await inbound(sid)).toMatchObject({ understoodAs: 'stop', handledAt: HOSPITAL_NOW });
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
