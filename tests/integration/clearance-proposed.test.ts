import { beforeEach, describe, expect, it } from 'vitest';
import { giveClearanceBody, type ClearanceLimits } from '$lib/domain/clearances/forms';
import { askClearance, giveClearance, holdClearance } from '$lib/server/clearances/actions';
import { getClearance } from '$lib/server/clearances/queries';
import { db } from '$lib/server/db';
import { getThread } from '$lib/server/threads/queries';
import { addPatient, addReferral, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
let episodeId: string;
let threadId: string;

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
	({ threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id }));
});

const as = (role: keyof Hospital['people'], minutes = 0) =>
	contextOf(hospital.people[role], hospital.now + minutes * 60_000);
const shown = (id: string) => getClearance(db(), hospital.people.nurse, id, hospital.now);
const SPEED: ClearanceLimits = { text: 'Level, up to 2.5 km/h' };

async function ask(proposed?: ClearanceLimits, kind: 'treadmill' | 'arm-stage' = 'treadmill') {
	const input = { kind, question: 'May it start?', proposed, threadId };
	return (await askClearance(as('therapist'), episodeId, input)).result.id;
}

describe('limits that an ask proposes', () => {
	it('stand with the ask, for whoever decides and in the thread', async () => {
		expect(await shown(await ask(SPEED))).toMatchObject({ state: 'asked', proposed: SPEED, limits: null });
		const thread = await getThread(db(), hospital.people.nurse, threadId, { limit: 200, after: null });
		expect(thread.items.at(-1)?.body).toBe('Treadmill: May it start? Proposed: Level, up to 2.5 km/h');
	});

	it.each([
		['nothing', undefined],
		['no figure', {}]
	])('of %s are none', async (_, proposed) => {
		const id = await ask(proposed);
		expect((await shown(id)).proposed).toBeNull();
		await giveClearance(as('surgeon', 1), id, {});
		expect((await shown(id)).state).toBe('given');
	});

	it('are not passed over by a yes that leaves limits out', async () => {
		const id = await ask({ maxElevationDeg: 90 }, 'arm-stage');
		await expect(giveClearance(as('surgeon', 1), id, {})).rejects.toMatchObject({
			code: 'invalid',
			extra: { errors: [expect.objectContaining({ pointer: '/limits' })] }
		});
		expect((await shown(id)).state).toBe('asked');
	});

	it.each<[string, ClearanceLimits | null, string]>([
		['as proposed', SPEED, 'given-with-limits'],
		['changed', { text: 'Level, up to 2 km/h' }, 'given-with-limits'],
		['none, said in so many words', null, 'given']
	])('are given %s', async (_, limits, state) => {
		const id = await ask(SPEED);
		await giveClearance(as('surgeon', 1), id, giveClearanceBody.parse({ limits }));
		expect(await shown(id)).toMatchObject({ state, limits, proposed: SPEED });
	});

	it('bind the first decision alone: what was on hold is given again as its decider says', async () => {
		const id = await ask(SPEED);
		await giveClearance(as('surgeon', 1), id, { limits: SPEED });
		await holdClearance(as('surgeon', 2), id, 'Dizzy.');
		await giveClearance(as('surgeon', 3), id, {});
		expect((await shown(id)).state).toBe('given');
	});
});
