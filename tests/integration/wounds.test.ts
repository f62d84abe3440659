import { beforeEach, describe, expect, it } from 'vitest';
import { recordSession } from '$lib/server/bedside/actions';
import { askClearance, giveClearance, holdClearance } from '$lib/server/clearances/actions';
import { getClearance } from '$lib/server/clearances/queries';
import { db } from '$lib/server/db';
import { noteWound } from '$lib/server/wounds/actions';
import { newestWoundNote } from '$lib/server/wounds/queries';
import { addPatient, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { sessionBody } from '../support/session';

const hospital = await openHospital();
let episodeId: string;

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
});

const as = (role: keyof Hospital['people'], seconds = 0) =>
	contextOf(hospital.people[role], hospital.now + seconds * 1000);
const DRY = { wound: 'dry', sternum: 'stable' } as const;

describe('a note about the wound', () => {
	it('is the newest one, with who looked and when', async () => {
		await noteWound(as('nurse'), episodeId, { wound: 'moist' });
		await noteWound(as('nurse', 60), episodeId, { ...DRY, note: 'Dressing off.' });
		expect(await newestWoundNote(db(), episodeId)).toEqual({
			...DRY,
			note: 'Dressing off.',
			by: hospital.people.nurse.name,
			at: '2026-03-03T09:01:00.000Z'
		});
	});

	it('is null where nobody has looked', async () => {
		expect(await newestWoundNote(db(), episodeId)).toBeNull();
	});

	it.each(['coordinator', 'admin'] as const)('is not for a %s', async (role) => {
		await expect(noteWound(as(role), episodeId, DRY)).rejects.toMatchObject({ code: 'not-allowed' });
	});

	it('of a patient of another unit is not there', async () => {
		const outside = noteWound(contextOf(hospital.outsider), episodeId, DRY);
		await expect(outside).rejects.toMatchObject({ code: 'not-found' });
	});
});

describe('the evidence of a clearance', () => {
	const shown = async (id: string) => getClearance(db(), hospital.people.nurse, id, hospital.now);

	it('holds what a surgeon needs, and is kept again with the decision', async () => {
		await noteWound(as('nurse'), episodeId, { wound: 'moist', sternum: 'stable' });
		await recordSession(as('therapist'), episodeId, sessionBody({ after: { hr: 80, sbp: 108, dbp: 66 } }));
		const { result } = await askClearance(as('therapist', 60), episodeId, {
			kind: 'arm-stage',
			question: 'May it start?'
		});
		expect(result.evidence).toMatchObject({
			at: '2026-03-03T09:01:00.000Z',
			procedure: 'Coronary artery bypass',
			operatedOn: '2026-03-01',
			postOpDay: 2,
			level: 2,
			betaBlocked: true,
			rhythm: 'sinus',
			wound: { wound: 'moist', sternum: 'stable' },
			precautions: { sternal: true, maxElevationDeg: 45 },
			sessions: [{ outcome: 'stop', findings: [expect.stringContaining('20')] }]
		});
		expect((await shown(result.id)).decidedOn).toBeNull();

		await noteWound(as('nurse', 120), episodeId, DRY);
		await giveClearance(as('surgeon', 180), result.id, { limits: { maxElevationDeg: 60 } });
		expect(await shown(result.id)).toMatchObject({
			askedOn: { wound: { wound: 'moist' } },
			decidedOn: { at: '2026-03-03T09:03:00.000Z', wound: { wound: 'dry' } }
		});

		await noteWound(as('nurse', 240), episodeId, { sternum: 'click' });
		await holdClearance(as('surgeon', 300), result.id, 'Click felt.');
		expect((await shown(result.id)).decidedOn).toMatchObject({
			at: '2026-03-03T09:05:00.000Z',
			wound: { sternum: 'click' },
			precautions: { maxElevationDeg: 60 }
		});
	});
});
