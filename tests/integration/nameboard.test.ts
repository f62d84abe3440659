import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { sessionBody } from '$lib/domain/bedside/forms';
import { bewareWords } from '$lib/components/patient/words';
import { askClearance, giveClearance } from '$lib/server/clearances/actions';
import { db } from '$lib/server/db';
import { recordSession } from '$lib/server/bedside/actions';
import { operations, patients } from '$lib/server/db/schema';
import { listEpisodes } from '$lib/server/episodes/list';
import { movePatient } from '$lib/server/episodes/move';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { addPatient, contextOf, ZONE } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
let episodeId: string;

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
});

const DAY = 24 * 3600 * 1000;
const board = (now = hospital.now) => getNameboard(db(), hospital.people.nurse, episodeId, now);
const beware = async (now = hospital.now) =>
	bewareWords((await board(now)).precautions, { now, zone: ZONE }).join(' · ');
const onTheWard = async () =>
	(
		await listEpisodes(db(), hospital.people.nurse, hospital.now, null, { limit: 200, after: null })
	).items.find(({ id }) => id === episodeId);
const operatedAt = (at: number) =>
	db().update(operations).set({ operatedAt: at }).where(eq(operations.episodeId, episodeId));

describe('whose board it is', () => {
	it('stands on it three times: name, birth date and hospital number', async () => {
		const { patient } = await board();
		const [row] = await db().select().from(patients).where(eq(patients.id, patient.id));
		expect(patient).toMatchObject({ name: row?.name, birthDate: row?.birthDate, mrn: row?.mrn });
		expect([row?.birthDate, row?.mrn]).not.toContain(undefined);
	});
});

describe('a patient without an operation on record', () => {
	it('is not said to have no precautions, and keeps the cautious level', async () => {
		await db().delete(operations).where(eq(operations.episodeId, episodeId));
		expect(await beware()).toBe('Precautions not known');
		expect(await board()).toMatchObject({
			mayDoNow: { chair: 'one', stairs: 'not' },
			notKnown: ['operation']
		});
		expect(await onTheWard()).toMatchObject({ notKnown: ['operation'] });
	});
});

describe('a patient before the operation', () => {
	it('has no day, no precautions and no level that decides, until the minute it begins', async () => {
		await operatedAt(hospital.now + DAY);
		expect(await board()).toMatchObject({ postOpDay: null, mayDoNow: null });
		expect(await beware()).toBe('Precautions begin with the operation');
		expect(await onTheWard()).toMatchObject({ mayDoNow: null, postOpDay: null });
		// Day 0 is the day of surgery; its first minutes are still before the operation.
		expect(await board(hospital.now + DAY - 1)).toMatchObject({ postOpDay: 0, mayDoNow: null });
		expect(await board(hospital.now + DAY)).toMatchObject({
			postOpDay: 0,
			precautions: { sternal: true, maxElevationDeg: 45 },
			mayDoNow: { chair: 'one' }
		});
		expect(await beware(hospital.now + DAY)).toContain('Sternal precautions');
	});
});

describe('an outpatient', () => {
	it('carries the precautions, but nothing that the ward allowed', async () => {
		await movePatient(contextOf(hospital.people.coordinator), episodeId, { unit: 'East Gym' });
		expect(await board()).toMatchObject({
			phase: 'outpatient',
			mayDoNow: null,
			notKnown: [],
			precautions: { sternal: true }
		});
		expect(await onTheWard()).toMatchObject({ phase: 'outpatient', mayDoNow: null });
	});
});

describe('a patient whose breathing tube is on record', () => {
	const TUBED = {
		context: {
			betaBlocked: true,
			rhythm: 'sinus',
			sternotomy: true,
			level: 1,
			conscious: false,
			airway: 'tube'
		},
		startedAt: '2026-03-02T10:00:00Z',
		endedAt: '2026-03-02T10:15:00Z',
		level: 1,
		before: { hr: 92, sbp: 108, dbp: 58 },
		during: [],
		after: { hr: 92, sbp: 108, dbp: 58 },
		symptoms: [],
		activities: []
	} as const;
	const byMouth = async () => [(await board()).nothingByMouth, (await onTheWard())?.nothingByMouth];

	it('takes nothing by mouth until it is cleared, on the board and on the ward', async () => {
		const { therapist } = hospital.people;
		const speech = hospital.people['speech-therapist'];
		expect(await byMouth()).toEqual([false, false]);
		await recordSession(contextOf(therapist), episodeId, sessionBody.parse(TUBED));
		expect(await byMouth()).toEqual([true, true]);
		const ask = { kind: 'oral-intake', question: 'May she have sips?' } as const;
		const { result } = await askClearance(contextOf(therapist), episodeId, ask);
		expect(await byMouth()).toEqual([true, true]);
		await giveClearance(contextOf(speech), result.id, {});
		expect(await byMouth()).toEqual([false, false]);
	});

	it('is not told so at home', async () => {
		await recordSession(contextOf(hospital.people.therapist), episodeId, sessionBody.parse(TUBED));
		await movePatient(contextOf(hospital.people.coordinator), episodeId, { unit: 'East Gym' });
		expect(await byMouth()).toEqual([false, false]);
	});
});
