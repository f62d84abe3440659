import { beforeEach, describe, expect, it } from 'vitest';
import { giveClearance, askClearance, withdrawClearance } from '$lib/server/clearances/actions';
import { answerQuestion, askBack } from '$lib/server/clearances/ask-back';
import { getClearance } from '$lib/server/clearances/queries';
import { db } from '$lib/server/db';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { eventsAfter } from '$lib/server/live/log';
import { getThread } from '$lib/server/threads/queries';
import { addPatient, addReferral, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
let episodeId: string;
let threadId: string;
let id: string;

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
	({ threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id }));
	const ask = { kind: 'arm-stage', question: 'May it start?' } as const;
	({ id } = (await askClearance(as('therapist'), episodeId, ask)).result);
});

const as = (role: keyof Hospital['people'], seconds = 0) =>
	contextOf(hospital.people[role], hospital.now + seconds * 1000);
const QUESTION = 'Does the breastbone click on coughing?';

async function ends(role: keyof Hospital['people'], side: 'mine' | 'theirs' = 'mine') {
	const all = await looseEndsOf(db(), hospital.people[role], hospital.now);
	return all[side].filter((end) => end.episodeId === episodeId).map(({ kind }) => kind);
}
const shown = () => getClearance(db(), hospital.people.nurse, id, hospital.now);

describe('asking back', () => {
	it('leaves the ask open, waits on whoever asked, and stands in the thread', async () => {
		const { result } = await askBack(as('surgeon', 60), id, QUESTION);
		expect(result).toMatchObject({ id, state: 'asked' });
		expect(await shown()).toMatchObject({
			state: 'asked',
			decidedAt: null,
			questions: [{ question: QUESTION, askedBy: hospital.people.surgeon.name, answer: null }]
		});
		expect(await ends('therapist')).toEqual(['clearance-question']);
		// Whoever asked back waits; the others who may decide still can.
		expect(await ends('surgeon')).toEqual([]);
		expect(await ends('surgeon', 'theirs')).toEqual(['clearance-question']);
		const thread = await getThread(db(), hospital.people.nurse, threadId, { limit: 200, after: null });
		expect(thread.items.at(-1)).toMatchObject({ kind: 'note', ref: { kind: 'clearance', id } });
		expect(thread.items.at(-1)?.body).toContain(QUESTION);
	});

	it('is answered once, after which it can be asked back again', async () => {
		await askBack(as('surgeon', 60), id, QUESTION);
		await answerQuestion(as('therapist', 120), id, 'No click.');
		expect(await ends('therapist')).toEqual([]);
		expect(await ends('surgeon')).toEqual(['clearance']);
		expect(await shown()).toMatchObject({
			state: 'asked',
			questions: [{ answer: 'No click.', answeredBy: hospital.people.therapist.name }]
		});
		await expect(answerQuestion(as('therapist'), id, 'Again.')).rejects.toMatchObject({
			code: 'wrong-state'
		});
		await askBack(as('surgeon', 180), id, 'And the wound?');
		expect((await shown()).questions).toHaveLength(2);
	});

	it('may be answered by a colleague of whoever asked', async () => {
		await askBack(as('surgeon'), id, QUESTION);
		await answerQuestion(as('nurse'), id, 'No click.');
		expect((await shown()).questions).toMatchObject([{ answeredBy: hospital.people.nurse.name }]);
	});

	it('is refused while a question waits, also of two who ask at once', async () => {
		const outcomes = await Promise.allSettled([
			askBack(as('surgeon'), id, QUESTION),
			askBack(as('surgeon'), id, 'And the wound?')
		]);
		expect(outcomes.map(({ status }) => status).toSorted()).toEqual(['fulfilled', 'rejected']);
		expect((await shown()).questions).toHaveLength(1);
	});

	it.each([
		['given', () => giveClearance(as('surgeon'), id, {})],
		['taken back', () => withdrawClearance(as('therapist'), id, 'Too early.')]
	])('waits on nobody once the ask is %s', async (_, end) => {
		await askBack(as('surgeon'), id, QUESTION);
		await end();
		expect(await ends('therapist')).toEqual([]);
		await expect(askBack(as('surgeon'), id, QUESTION)).rejects.toMatchObject({ code: 'wrong-state' });
		await expect(answerQuestion(as('therapist'), id, 'No.')).rejects.toMatchObject({ code: 'wrong-state' });
	});

	it.each(['physician', 'nurse', 'therapist', 'coordinator'] as const)(
		'about the arm stage is not for a %s',
		async (role) => {
			await expect(askBack(as(role), id, QUESTION)).rejects.toMatchObject({ code: 'not-allowed' });
		}
	);

	it('does not exist for a surgeon of another unit', async () => {
		await expect(askBack(contextOf(hospital.outsider), id, QUESTION)).rejects.toMatchObject({
			code: 'not-found'
		});
	});

	it('is heard live', async () => {
		await askBack(as('surgeon'), id, QUESTION);
		const heard = await eventsAfter(db(), 0);
		expect(heard).toContainEqual(
			expect.objectContaining({ topic: 'clearance', kind: 'asked-back', id, episodeId })
		);
	});
});
