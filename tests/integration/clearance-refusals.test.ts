import { beforeEach, describe, expect, it } from 'vitest';
import { staleKeys } from '$lib/domain/live/events';
import {
	askClearance,
	giveClearance,
	holdClearance,
	withdrawClearance,
	withholdClearance
} from '$lib/server/clearances/actions';
import { getClearance } from '$lib/server/clearances/queries';
import { acknowledgeRefusal } from '$lib/server/clearances/refusal';
import { reviewPrecautions } from '$lib/server/clearances/precautions';
import { db } from '$lib/server/db';
import { closeEpisode } from '$lib/server/episodes/close';
import { eventsAfter } from '$lib/server/live/log';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { getThread } from '$lib/server/threads/queries';
import { addPatient, addPerson, addReferral, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
let episodeId: string;
let threadId: string;
let id: string;

type Who = keyof Hospital['people'];
const as = (role: Who, minutes = 0) => contextOf(hospital.people[role], hospital.now + minutes * 60_000);
const ask = async (minutes = 0) =>
	(await askClearance(as('therapist', minutes), episodeId, { kind: 'stairs', question: 'May they?' })).result
		.id;

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
	({ threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id }));
	id = await ask();
});

async function ends(role: Who, side: 'mine' | 'theirs' = 'mine') {
	const all = await looseEndsOf(db(), hospital.people[role], hospital.now);
	return all[side].filter((end) => end.episodeId === episodeId);
}
const refusals = async (role: Who) => (await ends(role)).filter(({ kind }) => kind === 'refusal');

/** Each way in which an ask comes to be not cleared, the reason last said. */
const NOES: [string, () => Promise<unknown>][] = [
	['refused', () => withholdClearance(as('surgeon', 1), id, 'Wound is wet.')],
	[
		'given and withdrawn',
		async () => {
			await giveClearance(as('surgeon', 1), id, {});
			await withdrawClearance(as('surgeon', 2), id, 'Wound is wet.');
		}
	],
	[
		'given and put on hold',
		async () => {
			await giveClearance(as('surgeon', 1), id, {});
			await holdClearance(as('surgeon', 2), id, 'Wound is wet.');
		}
	]
];

describe('an ask that was not cleared', () => {
	it.each(NOES)('%s, waits on whoever asked with its reason, and on nobody else', async (_, refuse) => {
		await refuse();
		expect(await ends('therapist')).toMatchObject([
			{
				kind: 'refusal',
				id,
				code: 'stairs',
				title: 'Stairs. Not cleared: Wound is wet.',
				askedBy: hospital.people.surgeon.name
			}
		]);
		expect(await ends('therapist', 'theirs')).toEqual([]);
		for (const role of ['surgeon', 'physician', 'nurse', 'coordinator'] as const) {
			expect(await refusals(role)).toEqual([]);
		}
	});

	it.each(NOES)('%s, stays until they say that they saw it, which is on record', async (_, refuse) => {
		await refuse();
		const view = () => getClearance(db(), hospital.people.therapist, id, hospital.now);
		expect((await view()).unseen).toBe(true);
		await acknowledgeRefusal(as('therapist', 3), id);
		expect(await ends('therapist')).toEqual([]);
		expect((await view()).unseen).toBe(false);
		const thread = await getThread(db(), hospital.people.nurse, threadId, { limit: 200, after: null });
		expect(thread.items.at(-1)).toMatchObject({ kind: 'event', ref: { kind: 'clearance', id } });
		const told = (await eventsAfter(db(), 0)).findLast(({ topic }) => topic === 'clearance');
		expect(told).toMatchObject({ kind: 'refusal-seen', id });
		expect(told && staleKeys(told)).toContainEqual(['loose-ends']);
	});

	it('is not seen by reading, nor by anybody else, nor twice', async () => {
		await withholdClearance(as('surgeon', 1), id, 'Wound is wet.');
		await getClearance(db(), hospital.people.therapist, id, hospital.now);
		await expect(acknowledgeRefusal(as('nurse', 2), id)).rejects.toMatchObject({ code: 'not-allowed' });
		const colleague = contextOf(
			await addPerson({ role: 'therapist', unitIds: [hospital.units.ward] }),
			hospital.now + 120_000
		);
		await expect(acknowledgeRefusal(colleague, id)).rejects.toMatchObject({ code: 'not-allowed' });
		expect(await refusals('therapist')).toHaveLength(1);
		await acknowledgeRefusal(as('therapist', 3), id);
		await expect(acknowledgeRefusal(as('therapist', 4), id)).rejects.toMatchObject({ code: 'wrong-state' });
	});

	it('is open again after the next no', async () => {
		await giveClearance(as('surgeon', 1), id, {});
		await holdClearance(as('surgeon', 2), id, 'Fell.');
		await acknowledgeRefusal(as('therapist', 3), id);
		await withdrawClearance(as('surgeon', 4), id, 'Wound is wet.');
		expect(await refusals('therapist')).toMatchObject([{ title: 'Stairs. Not cleared: Wound is wet.' }]);
	});

	it('ends with a new ask of the kind, and with the stay', async () => {
		await withholdClearance(as('surgeon', 1), id, 'Wound is wet.');
		const again = await ask(2);
		expect(await refusals('therapist')).toEqual([]);
		await withholdClearance(as('surgeon', 3), again, 'Still wet.');
		expect(await refusals('therapist')).toMatchObject([{ id: again }]);
		await closeEpisode(as('nurse', 4), episodeId, 'home');
		expect(await refusals('therapist')).toEqual([]);
	});
});

describe('what is no answer to be seen', () => {
	it.each<[string, () => Promise<unknown>]>([
		['asked and not decided', async () => {}],
		['given', () => giveClearance(as('surgeon', 1), id, {})],
		['taken back by whoever asked', () => withdrawClearance(as('therapist', 1), id, 'Asked by mistake.')]
	])('%s', async (_, before) => {
		await before();
		expect(await refusals('therapist')).toEqual([]);
		await expect(acknowledgeRefusal(as('therapist', 2), id)).rejects.toMatchObject({ code: 'wrong-state' });
	});

	it('one’s own no to one’s own question', async () => {
		const { result } = await reviewPrecautions(as('surgeon'), episodeId);
		await withholdClearance(as('surgeon', 1), result.id, 'Not yet.');
		expect(await refusals('surgeon')).toEqual([]);
	});
});
