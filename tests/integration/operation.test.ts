import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { askClearance, giveClearance } from '$lib/server/clearances/actions';
import { db } from '$lib/server/db';
import { audit, operationAmendments, patientAmendments, patients } from '$lib/server/db/schema';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { correctionsOf, recordOperation } from '$lib/server/episodes/operation';
import { amendContact } from '$lib/server/episodes/patient';
import { addPatient, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
const { coordinator, nurse, surgeon, therapist } = hospital.people;
let episodeId: string;
let operationId: string;
let patientId: string;

beforeEach(async () => {
	const added = await addPatient({ unitId: hospital.units.ward });
	({ episodeId, operationId } = added);
	patientId = added.patient.id;
});

const OPERATION = {
	procedure: 'Valve',
	approach: 'sternotomy',
	operatedAt: '2026-03-02T08:00:00.000Z'
} as const;
const board = () => getNameboard(db(), nurse, episodeId, hospital.now);

describe('an operation after the admission', () => {
	it('is corrected in place, with what it said before, by whom, on record', async () => {
		const before = await board();
		await recordOperation(contextOf(surgeon), episodeId, { ...OPERATION, corrects: operationId });
		expect(await board()).toMatchObject({ ...OPERATION, operationId, postOpDay: 1 });
		const corrections = await correctionsOf(db(), nurse, episodeId);
		expect(corrections).toContainEqual(
			expect.objectContaining({ field: 'procedure', before: before.procedure, by: surgeon.name })
		);
		expect(corrections).toContainEqual(
			expect.objectContaining({ field: 'operatedAt', before: before.operatedAt })
		);
		const [row] = await db().select().from(audit).where(eq(audit.objectId, operationId));
		expect(row?.action).toBe('operation.corrected');
	});

	it('that is a further one is what clearances count from', async () => {
		const ask = await askClearance(contextOf(therapist), episodeId, { kind: 'stairs', question: 'May she?' });
		await giveClearance(contextOf(surgeon), ask.result.id, {});
		await recordOperation(contextOf(coordinator), episodeId, OPERATION);
		const { clearances, ...now } = await board();
		expect(now).toMatchObject(OPERATION);
		expect(now.operationId).not.toBe(operationId);
		expect(clearances[0]).toMatchObject({ kind: 'stairs', current: false });
		expect(await db().$count(operationAmendments, eq(operationAmendments.operationId, operationId))).toBe(0);
	});

	it('is refused where the record says it already, or the operation is of another stay', async () => {
		await recordOperation(contextOf(surgeon), episodeId, { ...OPERATION, corrects: operationId });
		const again = recordOperation(contextOf(surgeon), episodeId, { ...OPERATION, corrects: operationId });
		await expect(again).rejects.toMatchObject({ code: 'wrong-state' });
		const other = await addPatient({ unitId: hospital.units.ward });
		const foreign = recordOperation(contextOf(surgeon), other.episodeId, {
			...OPERATION,
			corrects: operationId
		});
		await expect(foreign).rejects.toMatchObject({ code: 'invalid' });
	});

	it.each(['nurse', 'therapist'] as const)('is not for a %s to record', async (role) => {
		const refused = recordOperation(contextOf(hospital.people[role]), episodeId, OPERATION);
		await expect(refused).rejects.toMatchObject({ code: 'not-allowed' });
	});
});

describe('how a patient is reached', () => {
	const record = async () => (await db().select().from(patients).where(eq(patients.id, patientId)))[0];

	it('is put right by a coordinator, and what stood there stays on record', async () => {
		const before = await record();
		await amendContact(contextOf(coordinator), episodeId, { phone: '086 555 1234', smsConsent: false });
		expect(await record()).toMatchObject({ phone: '+353865551234', smsConsent: false });
		const rows = await db()
			.select()
			.from(patientAmendments)
			.where(eq(patientAmendments.patientId, patientId));
		expect(rows).toContainEqual(
			expect.objectContaining({ field: 'phone', before: before?.phone, byId: coordinator.id })
		);
	});

	it('leaves out what was left out, and takes a number away that was emptied', async () => {
		await amendContact(contextOf(nurse), episodeId, { phone: null });
		expect(await record()).toMatchObject({ phone: null, smsConsent: true });
	});

	it('names a number that is none, and says when nothing would change', async () => {
		const wrong = amendContact(contextOf(coordinator), episodeId, { phone: '12' });
		await expect(wrong).rejects.toMatchObject({ extra: { errors: [{ pointer: '/phone' }] } });
		const same = amendContact(contextOf(coordinator), episodeId, { smsConsent: true });
		await expect(same).rejects.toMatchObject({ code: 'wrong-state' });
	});
});
