import { beforeEach, describe, expect, it } from 'vitest';
import { recordSession } from '$lib/server/bedside/actions';
import {
	askClearance,
	giveClearance,
	holdClearance,
	withholdClearance
} from '$lib/server/clearances/actions';
import { getClearance } from '$lib/server/clearances/queries';
import { db } from '$lib/server/db';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { getThread } from '$lib/server/threads/queries';
import { noteWound } from '$lib/server/wounds/actions';
import { addPatient, addReferral, contextOf, type Hospital } from '../support/hospital';
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
	it('stands with who looked and when, until the same part is looked at again', async () => {
		await noteWound(as('therapist'), episodeId, { wound: 'moist', sternum: 'moves' });
		await noteWound(as('nurse', 60), episodeId, { wound: 'dry' });
		await noteWound(as('nurse', 120), episodeId, { note: 'Dressing off.' });
		const { wound, wounds } = await getNameboard(db(), hospital.people.nurse, episodeId, hospital.now);
		expect(wounds).toHaveLength(3);
		expect(wound).toMatchObject({
			wound: 'dry',
			sternum: 'moves',
			note: 'Dressing off.',
			noted: {
				wound: { by: hospital.people.nurse.name, at: '2026-03-03T09:01:00.000Z' },
				sternum: { by: hospital.people.therapist.name, at: '2026-03-03T09:00:00.000Z' }
			}
		});
		await noteWound(as('therapist', 180), episodeId, { sternum: 'stable' });
		const after = await getNameboard(db(), hospital.people.nurse, episodeId, hospital.now);
		expect(after.wound).toMatchObject({ wound: 'dry', sternum: 'stable' });
	});

	it('is still found when ten others have looked at the skin since', async () => {
		await noteWound(as('therapist'), episodeId, { sternum: 'click' });
		for (let minute = 1; minute <= 10; minute += 1) {
			await noteWound(as('nurse', 60 * minute), episodeId, { wound: 'dry' });
		}
		const { wound } = await getNameboard(db(), hospital.people.surgeon, episodeId, hospital.now);
		expect(wound).toMatchObject({ wound: 'dry', sternum: 'click' });
	});

	it('is null where nobody has looked, and for who reads no sessions', async () => {
		const seenBy = async (role: keyof Hospital['people']) =>
			(await getNameboard(db(), hospital.people[role], episodeId, hospital.now)).wound;
		expect(await seenBy('nurse')).toBeNull();
		await noteWound(as('nurse'), episodeId, DRY);
		expect(await seenBy('nurse')).not.toBeNull();
		expect(await seenBy('coordinator')).toBeNull();
	});

	it('stands in the thread, and is withheld there from who reads no sessions', async () => {
		const { threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id });
		await noteWound(as('nurse'), episodeId, { sternum: 'moves' });
		const said = async (role: keyof Hospital['people']) =>
			(await getThread(db(), hospital.people[role], threadId, { limit: 50, after: null })).items.at(-1)?.body;
		expect(await said('surgeon')).toContain('breastbone moves');
		expect(await said('coordinator')).not.toContain('breastbone moves');
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

	it('keeps a breastbone that moves, whatever others note of the wound before the decision', async () => {
		await noteWound(as('therapist'), episodeId, { sternum: 'moves' });
		const { result } = await askClearance(as('therapist', 30), episodeId, {
			kind: 'arm-stage',
			question: 'May it start?'
		});
		await noteWound(as('nurse', 60), episodeId, { wound: 'dry' });
		await noteWound(as('nurse', 90), episodeId, { note: 'Slept well.' });
		await withholdClearance(as('surgeon', 120), result.id, 'The bone moves.');
		const { decidedOn } = await shown(result.id);
		expect(decidedOn?.wound).toMatchObject({ wound: 'dry', sternum: 'moves', note: 'Slept well.' });
		const coordinator = hospital.people.coordinator;
		const withheld = await getClearance(db(), coordinator, result.id, hospital.now);
		expect(withheld.decidedOn?.wound).toBeNull();
	});

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
