import { eq, ne } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { outbox, patientAmendments, patients, reminders } from '$lib/server/db/schema';
import { admitPatient } from '$lib/server/episodes/actions';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { amendContact } from '$lib/server/episodes/patient';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { bookVisits, confirmVisit } from '$lib/server/visits/actions';
import { POST as postContact } from '../../src/routes/api/episodes/[id]/contact/+server';
import { POST as postEpisode } from '../../src/routes/api/episodes/+server';
import { callRoute } from '../support/call';
import { ScriptedChannel, unknown } from '../support/channels';
import { HOSPITAL_NOW, addPatient, contextOf } from '../support/hospital';
import { remindersOf } from '../support/messages';
import { openHospital } from '../support/open-hospital';

/** Whose daytime counts for texts: entered at the admission or later, and obeyed by what is planned already. */

const hospital = await openHospital({ PORT: '4300' });
const { coordinator, nurse } = hospital.people;
const at = (text: string) => Date.parse(text);
/** Monday 9 March 2026, 10:00 in Dublin. */
const MONDAY = at('2026-03-09T10:00:00Z');

const admission = (patient: object = {}) => ({
	patient: {
		name: 'Nell Copperfern',
		birthDate: '1951-02-03',
		sex: 'female' as const,
		mrn: 'Z-1',
		...patient
	},
	unit: hospital.units.gym
});

async function booked() {
	const made = await addPatient({ unitId: hospital.units.ward });
	const input = { kind: 'single', startsAt: MONDAY, minutes: 45, place: 'East Gym' } as const;
	const { result } = await bookVisits(contextOf(coordinator), made.episodeId, input);
	return { ...made, visitId: result.items[0]?.id ?? '' };
}

const hours = async (visitId: string) =>
	(await remindersOf(visitId)).map(({ nextAt }) => new Date(nextAt).toISOString());

describe('the zone of a patient', () => {
	it.each([
		[undefined, 'Europe/Dublin'],
		['America/New_York', 'America/New_York']
	])('admitted with %s is %s', async (zone, kept) => {
		const { result } = await admitPatient(contextOf(nurse), admission({ mrn: `Z-${kept}`, zone }));
		const [row] = await db().select().from(patients).where(eq(patients.id, result.patientId));
		expect(row?.zone).toBe(kept);
	});

	it('is put right, with what stood there before on record, and shown on the nameboard', async () => {
		const { patient, episodeId } = await addPatient({ unitId: hospital.units.ward });
		await amendContact(contextOf(coordinator), episodeId, { zone: 'Pacific/Auckland' });
		const [kept] = await db()
			.select()
			.from(patientAmendments)
			.where(eq(patientAmendments.patientId, patient.id));
		expect(kept).toMatchObject({
			field: 'zone',
			before: 'Europe/Dublin',
			after: 'Pacific/Auckland',
			byId: coordinator.id
		});
		const board = await getNameboard(db(), coordinator, episodeId, HOSPITAL_NOW);
		expect(board.patient.zone).toBe('Pacific/Auckland');
	});

	it.each(['Dublin', '+01:00', 'Europe/Atlantis', ''])(
		'that is "%s" is refused with field and value',
		async (zone) => {
			const message = `zone is '${zone}': it must be the name of a time zone such as Europe/Dublin.`;
			const contact = await callRoute(postContact, coordinator, {
				params: { id: hospital.episodeId },
				body: { zone }
			});
			expect([contact.status, contact.body]).toMatchObject([
				422,
				{ errors: [{ pointer: '/zone', message }] }
			]);
			const admitted = await callRoute(postEpisode, nurse, { body: admission({ zone }) });
			expect(admitted.body).toMatchObject({ errors: [{ pointer: '/patient/zone', message }] });
		}
	);
});

describe('reminders that are planned already', () => {
	it.each([
		// 17:00 in Dublin is 06:00 of the next day there, so two hours later is the nearest hour that is allowed.
		['Pacific/Auckland', ['2026-03-07T19:00:00.000Z', '2026-03-08T19:00:00.000Z']],
		// Noon there.
		['America/New_York', ['2026-03-07T17:00:00.000Z', '2026-03-08T17:00:00.000Z']],
		// Ten at night: the evening is nearer than the morning after.
		['Asia/Karachi', ['2026-03-07T14:59:00.000Z', '2026-03-08T14:59:00.000Z']]
	])('move to the daytime of %s', async (zone, wanted) => {
		const { episodeId, visitId } = await booked();
		await amendContact(contextOf(coordinator), episodeId, { zone });
		expect(await hours(visitId)).toEqual(wanted);
		const dueAt = await db()
			.select({ at: reminders.dueAt })
			.from(reminders)
			.where(eq(reminders.visitId, visitId));
		expect(dueAt.map((row) => new Date(row.at).toISOString()).toSorted()).toEqual(wanted);
	});

	it('tell the language that was corrected, and still do not ask who has said yes', async () => {
		const { episodeId, visitId } = await booked();
		await amendContact(contextOf(coordinator), episodeId, { language: 'es' });
		expect((await remindersOf(visitId)).map(({ body }) => body.includes('Responda SI o NO'))).toEqual([
			true,
			true
		]);
		await confirmVisit(contextOf(coordinator), visitId);
		const spanish = (await remindersOf(visitId)).map(({ body }) => body);
		await amendContact(contextOf(coordinator), episodeId, { language: 'en' });
		for (const [index, { body }] of (await remindersOf(visitId)).entries()) {
			expect(body).not.toBe(spanish[index]);
			expect(body).toContain('Reply NO if you cannot come');
		}
	});

	it('that were tried keep their words, and their hour', async () => {
		const { episodeId, visitId, patient } = await booked();
		const sms = new ScriptedChannel();
		sms.script = [unknown()];
		await db().update(outbox).set({ state: 'cancelled' }).where(ne(outbox.refId, visitId));
		const [first] = await remindersOf(visitId);
		await new OutboxWorker({
			channels: { sms, mail: null },
			now: () => first?.nextAt ?? 0,
			random: () => 0.5
		}).settle();
		const [tried] = await remindersOf(visitId);
		expect([tried?.attempts, sms.sent.map(({ to }) => to)]).toEqual([1, [patient.phone]]);
		const later = contextOf(coordinator, tried?.nextAt);
		await amendContact(later, episodeId, { language: 'es', zone: 'Pacific/Auckland' });
		const [kept] = await remindersOf(visitId);
		expect([kept?.body, kept?.nextAt]).toEqual([tried?.body, tried?.nextAt]);
	});
});
