import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { giveClearance, withdrawClearance, withholdClearance } from '$lib/server/clearances/actions';
import { reviewPrecautions } from '$lib/server/clearances/precautions';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { closeEpisode } from '$lib/server/episodes/close';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { freshDatabase } from '../support/database';
import { addPatient, contextOf, makeHospital, type Hospital } from '../support/hospital';

const DAY = 24 * 60 * 60 * 1000;
/** Operated in the evening of 6 January: eight weeks later is 3 March, the day of the fixture. */
const OPERATED = Date.parse('2026-01-06T20:30:00Z');

let close: () => void;
let hospital: Hospital;
let episodeId: string;

beforeAll(async () => {
	({ close } = await freshDatabase());
	hospital = await makeHospital();
});
beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.gym, operatedAt: OPERATED }));
});
afterAll(() => close());

type Who = keyof Hospital['people'];
const as = (role: Who, now = hospital.now) => contextOf(hospital.people[role], now);
const review = async (now = hospital.now) =>
	(await reviewPrecautions(as('surgeon', now), episodeId)).result.id;

async function kindsFor(role: Who, now = hospital.now): Promise<string[]> {
	const { mine, theirs } = await looseEndsOf(db(), hospital.people[role], now);
	return [...mine, ...theirs].filter((end) => end.episodeId === episodeId).map(({ kind }) => kind);
}

describe('the end of sternal precautions', () => {
	// Eight weeks, where six to eight are usual: common practice, no published source.
	it.each([
		['the last minute before its day', '2026-03-02T23:59:00Z', []],
		[
			'the first of it, though the hour of the operation is still to come',
			'2026-03-03T00:00:00Z',
			['precautions-due']
		],
		['weeks later, for it never ends by the calendar', '2026-06-01T12:00:00Z', ['precautions-due']]
	])('waits on the surgeon: %s', async (_, now, kinds) => {
		expect(await kindsFor('surgeon', Date.parse(now))).toEqual(kinds);
		expect(await kindsFor('physician', Date.parse(now))).toEqual([]);
		expect(await kindsFor('therapist', Date.parse(now))).toEqual([]);
	});

	it.each([
		['on its day', '2026-03-03T09:00:00Z'],
		['ten days later', '2026-03-13T23:00:00Z']
	])('says since when, %s', async (_, now) => {
		const { mine } = await looseEndsOf(db(), hospital.people.surgeon, Date.parse(now));
		expect(mine.find((end) => end.episodeId === episodeId)).toMatchObject({
			kind: 'precautions-due',
			code: 'precautions-end',
			since: '2026-03-03T00:00:00.000Z',
			title: 'End of the sternal precautions: due for your decision'
		});
	});

	it('still hold while it waits', async () => {
		const { precautions } = await getNameboard(
			db(),
			hospital.people.nurse,
			episodeId,
			hospital.now + 90 * DAY
		);
		expect(precautions).toMatchObject({ sternal: true, endDue: '2026-03-03', maxElevationDeg: 45 });
	});

	it('leads to the clearance: the surgeon puts it, it waits on the surgeons, and giving it ends them', async () => {
		const id = await review();
		expect(await kindsFor('surgeon')).toEqual(['clearance']);
		await giveClearance(as('surgeon', hospital.now + 1), id, {});
		expect(await kindsFor('surgeon', hospital.now + 2)).toEqual([]);
		const { precautions } = await getNameboard(db(), hospital.people.nurse, episodeId, hospital.now + 2);
		expect(precautions).toMatchObject({ sternal: false, endDue: null });
	});

	it('falls due again two weeks after a decision that did not end them', async () => {
		const id = await review();
		await withholdClearance(as('surgeon'), id, 'A click on coughing.');
		expect(await kindsFor('surgeon', hospital.now + 14 * DAY - 1)).toEqual([]);
		expect(await kindsFor('surgeon', hospital.now + 14 * DAY)).toEqual(['precautions-due']);
	});

	it('falls due again at once when the question is taken back, and the day after a review that is past', async () => {
		const taken = await review();
		await withdrawClearance(as('surgeon'), taken, 'Wrong patient.');
		expect(await kindsFor('surgeon')).toEqual(['precautions-due']);
		const given = await review();
		await giveClearance(as('surgeon'), given, { reviewOn: '2026-03-10' });
		expect(await kindsFor('surgeon', Date.parse('2026-03-10T23:59:00Z'))).toEqual([]);
		expect(await kindsFor('surgeon', Date.parse('2026-03-11T00:00:00Z'))).toEqual(['precautions-due']);
	});

	it('is nobody’s after the stay', async () => {
		await closeEpisode(as('nurse'), episodeId, 'home');
		expect(await kindsFor('surgeon')).toEqual([]);
	});
});

describe('putting the question', () => {
	it('is the surgeon’s, once, and of a patient whom precautions hold', async () => {
		await expect(reviewPrecautions(as('physician'), episodeId)).rejects.toMatchObject({
			code: 'not-allowed'
		});
		await expect(reviewPrecautions(contextOf(hospital.outsider), episodeId)).rejects.toMatchObject({
			code: 'not-found'
		});
		const id = await review();
		await expect(review()).rejects.toMatchObject({ code: 'already-asked', extra: { id } });
		await giveClearance(as('surgeon'), id, {});
		await expect(review(hospital.now + 1)).rejects.toMatchObject({ code: 'wrong-state' });
	});
});
