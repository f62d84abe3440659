import { and, eq, isNull } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { admitBody } from '$lib/domain/episodes/forms';
import { db } from '$lib/server/db';
import { audit, episodes, patientAmendments, patients, placements } from '$lib/server/db/schema';
import { written } from '$lib/domain/episodes/identifiers';
import { admitPatient } from '$lib/server/episodes/actions';
import { closeEpisode } from '$lib/server/episodes/close';
import { addPerson, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
let count = 0;

const PERSON = { name: 'Maeve Sandoval', birthDate: '1961-02-11', sex: 'female' } as const;
const as = (role: keyof Hospital['people'] = 'coordinator') => contextOf(hospital.people[role]);

/** An admission to a bed that is free; `patient` and `more` change what a case is about. */
function asked(patient: object = {}, more: object = {}) {
	count += 1;
	return admitBody.parse({
		patient: { ...PERSON, mrn: `A-${count}`, ...patient },
		unit: 'Tern Ward',
		bed: `A${count}`,
		...more
	});
}

/** Somebody who was here before: admitted, and the stay closed. */
async function wasHere(patient: object = {}) {
	const input = asked(patient);
	const { result } = await admitPatient(as(), input);
	await closeEpisode(as(), result.id, 'home');
	return { mrn: input.patient.mrn, ...result };
}

const patientOf = async (id: string) => (await db().select().from(patients).where(eq(patients.id, id))).at(0);

describe('who is admitted', () => {
	it('is one patient for one hospital number, however it is written', async () => {
		const { mrn, patientId } = await wasHere();
		const again = await admitPatient(as(), asked({ mrn: ` ${mrn.toLowerCase().replace('-', ' ')} ` }));
		expect(again.result.patientId).toBe(patientId);
		expect((await patientOf(patientId))?.mrn).toBe(mrn);
	});

	it('is not admitted twice: the refusal says where the patient is', async () => {
		const input = asked();
		const { result } = await admitPatient(as(), input);
		const twice = admitPatient(as(), asked({ mrn: input.patient.mrn.toLowerCase() }));
		await expect(twice).rejects.toMatchObject({
			code: 'already-admitted',
			status: 409,
			detail: expect.stringContaining(`Tern Ward, bed ${input.bed}`),
			extra: { unit: 'Tern Ward', bed: input.bed, episodeId: result.id }
		});
		const open = and(eq(episodes.patientId, result.patientId), isNull(episodes.closedAt));
		expect(await db().$count(episodes, open)).toBe(1);
	});

	it('is named to another unit without the way into the record', async () => {
		const input = asked();
		await admitPatient(as(), input);
		const elsewhere = await addPerson({ role: 'nurse', unitIds: [hospital.units.icu] });
		const twice = admitPatient(
			contextOf(elsewhere),
			asked({ mrn: input.patient.mrn }, { unit: 'Heron Unit' })
		);
		await expect(twice).rejects.toMatchObject({ code: 'already-admitted', extra: { unit: 'Tern Ward' } });
		await expect(twice).rejects.not.toHaveProperty('extra.episodeId');
	});

	it.each([
		['a birth date', { birthDate: '1961-02-12' }, '/patient/birthDate', '1961-02-11'],
		['a sex', { sex: 'male' }, '/patient/sex', 'female'],
		['a name', { name: 'Maeve Brook' }, '/patient/mrn', 'Maeve Sandoval']
	])('is refused with %s that the record contradicts', async (_, given, pointer, stored) => {
		const { mrn, patientId } = await wasHere();
		const before = await db().$count(episodes);
		const refused = admitPatient(as(), asked({ mrn, ...given }));
		await expect(refused).rejects.toMatchObject({
			code: 'invalid',
			extra: { errors: expect.arrayContaining([{ pointer, message: expect.stringContaining(stored) }]) }
		});
		expect(await db().$count(episodes)).toBe(before);
		expect(await patientOf(patientId)).toMatchObject(PERSON);
	});

	it('has a new name once a person says so, and the old one stays on record', async () => {
		const { mrn, patientId } = await wasHere();
		const married = { mrn, name: ' Maeve  Brook ' };
		await expect(admitPatient(as(), asked(married))).rejects.toMatchObject({
			extra: { confirm: 'confirmName' }
		});
		const { result } = await admitPatient(as('nurse'), asked(married, { confirmName: true }));
		expect((await patientOf(patientId))?.name).toBe('Maeve Brook');
		expect(
			await db().select().from(patientAmendments).where(eq(patientAmendments.patientId, patientId))
		).toMatchObject([
			{ field: 'name', before: 'Maeve Sandoval', after: 'Maeve Brook', byId: hospital.people.nurse.id }
		]);
		const [row] = await db().select().from(audit).where(eq(audit.objectId, patientId));
		expect(row).toMatchObject({
			action: 'patient.amended',
			episodeId: result.id,
			detail: { name: true }
		});
	});

	it('is not somebody else because the name was confirmed', async () => {
		const { mrn } = await wasHere();
		const stranger = asked({ mrn, name: 'Tom Reed', birthDate: '1985-01-01' }, { confirmName: true });
		await expect(admitPatient(as(), stranger)).rejects.toMatchObject({
			extra: {
				errors: [{ pointer: '/patient/mrn' }, { pointer: '/patient/name' }, { pointer: '/patient/birthDate' }]
			}
		});
	});

	it('keeps what was left out and stores what was given anew', async () => {
		const { mrn, patientId } = await wasHere({ phone: '086 111 2222', language: 'en', smsConsent: true });
		await admitPatient(as(), asked({ mrn })).then(({ result }) => closeEpisode(as(), result.id, 'home'));
		expect(await patientOf(patientId)).toMatchObject({
			phone: '+353861112222',
			language: 'en',
			smsConsent: true
		});
		await admitPatient(as(), asked({ mrn, phone: '086 111 3333', language: 'es', smsConsent: false }));
		expect(await patientOf(patientId)).toMatchObject({
			phone: '+353861113333',
			language: 'es',
			smsConsent: false
		});
		const kept = await db()
			.select()
			.from(patientAmendments)
			.where(eq(patientAmendments.patientId, patientId));
		expect(kept.map(({ field, before, after }) => [field, before, after]).toSorted()).toEqual([
			['language', 'en', 'es'],
			['phone', '+353861112222', '+353861113333'],
			['smsConsent', 'true', 'false']
		]);
	});
});

describe('an admission with several faults', () => {
	it('names all of them at once and writes nothing', async () => {
		const { mrn } = await wasHere();
		const before = await db().$count(episodes);
		const wrong = asked(
			{ mrn, name: 'Maeve Brook', phone: 'ring the ward' },
			{ bed: '4', surgeonId: 'Nobody At All' }
		);
		await expect(admitPatient(as(), wrong)).rejects.toMatchObject({
			code: 'invalid',
			extra: {
				errors: [
					{ pointer: '/bed' },
					{ pointer: '/surgeonId' },
					{ pointer: '/patient/phone' },
					{ pointer: '/patient/mrn' },
					{ pointer: '/patient/name' }
				]
			}
		});
		expect(await db().$count(episodes)).toBe(before);
	});

	it('born after today or before 1900 is refused, today is not', async () => {
		const born = (birthDate: string) => admitPatient(as(), asked({ birthDate }));
		for (const birthDate of ['2026-03-04', '1899-12-31']) {
			await expect(born(birthDate)).rejects.toMatchObject({
				extra: { errors: [{ pointer: '/patient/birthDate' }] }
			});
		}
		await expect(born('2026-03-03')).resolves.toBeDefined();
		await expect(born('1900-01-01')).resolves.toBeDefined();
	});
});

describe('where somebody is admitted', () => {
	it.each(['t9 ', 'T 9', 'Ｔ9'])('knows bed T9 when it is written %j', async (bed) => {
		const first = await admitPatient(as(), asked({}, { bed: 'T9' }));
		await expect(admitPatient(as(), asked({}, { bed }))).rejects.toMatchObject({
			code: 'bed-in-use',
			status: 409
		});
		await closeEpisode(as(), first.result.id, 'entered-in-error');
		const { result } = await admitPatient(as(), asked({}, { bed }));
		const [row] = await db().select().from(episodes).where(eq(episodes.id, result.id));
		const [placed] = await db().select().from(placements).where(eq(placements.episodeId, result.id));
		expect([row?.bed, placed?.bed]).toEqual([written(bed), written(bed)]);
		await closeEpisode(as(), result.id, 'entered-in-error');
	});

	it.each([undefined, null])('asks no bed in a gym, and has outpatients there (%s)', async (bed) => {
		const { result } = await admitPatient(as(), asked({}, { unit: 'East Gym', bed }));
		const [row] = await db().select().from(episodes).where(eq(episodes.id, result.id));
		expect(row).toMatchObject({ unitId: hospital.units.gym, bed: null, phase: 'outpatient' });
	});

	it('keeps the name of a place in a gym', async () => {
		const { result } = await admitPatient(as(), asked({}, { unit: 'East Gym', bed: 'Mat 2' }));
		const [row] = await db().select().from(episodes).where(eq(episodes.id, result.id));
		expect(row).toMatchObject({ bed: 'Mat 2', phase: 'outpatient' });
	});

	it('refuses a ward without a bed', async () => {
		const refused = admitPatient(as(), asked({}, { unit: 'Tern Ward', bed: undefined }));
		await expect(refused).rejects.toMatchObject({
			code: 'invalid',
			extra: { errors: [{ pointer: '/bed', message: expect.stringContaining('The bed is empty') }] }
		});
	});
});

describe('the surgeon of a stay', () => {
	const surgeon = (name: string, disabledAt?: number) =>
		addPerson({ role: 'surgeon', unitIds: [hospital.units.ward], name, disabledAt });
	const refusedWith = (words: string) => ({
		code: 'invalid',
		extra: { errors: [{ pointer: '/surgeonId', message: expect.stringContaining(words) }] }
	});

	it('is one by exact name or identifier', async () => {
		const one = await surgeon('Orla Keane');
		for (const surgeonId of [one.id, 'Orla Keane']) {
			const { result } = await admitPatient(as(), asked({}, { surgeonId }));
			const [row] = await db().select().from(episodes).where(eq(episodes.id, result.id));
			expect(row?.surgeonId).toBe(one.id);
		}
	});

	it('is not picked among two of one name', async () => {
		const [one] = [await surgeon('Finn Daly'), await surgeon('Finn Daly')];
		await expect(admitPatient(as(), asked({}, { surgeonId: 'Finn Daly' }))).rejects.toMatchObject(
			refusedWith('2 surgeons are called "Finn Daly"')
		);
		await expect(admitPatient(as(), asked({}, { surgeonId: one.id }))).resolves.toBeDefined();
	});

	it('is nobody whose account is disabled, and does not hide another of the name', async () => {
		const gone = await surgeon('Nora Pike', hospital.now - 1);
		for (const surgeonId of [gone.id, 'Nora Pike']) {
			await expect(admitPatient(as(), asked({}, { surgeonId }))).rejects.toMatchObject(
				refusedWith('disabled')
			);
		}
		await surgeon('Nora Pike');
		await expect(admitPatient(as(), asked({}, { surgeonId: 'Nora Pike' }))).resolves.toBeDefined();
	});

	it('is nobody of another role, even with the name of one', async () => {
		await addPerson({ role: 'nurse', unitIds: [hospital.units.ward], name: 'Ada Quill' });
		await expect(admitPatient(as(), asked({}, { surgeonId: 'Ada Quill' }))).rejects.toMatchObject(
			refusedWith('There is no surgeon "Ada Quill"')
		);
	});
});
