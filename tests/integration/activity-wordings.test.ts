import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import type { WordActivity } from '$lib/domain/limits/forms';
import { db } from '$lib/server/db';
import { audit } from '$lib/server/db/schema';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { newId } from '$lib/server/ids';
import { listActivities } from '$lib/server/limits/activities';
import { wordActivity } from '$lib/server/limits/activity-actions';
import { addWard, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
const AGREED = { agreedBy: 'Maeve Tidewell', agreedOn: '2026-03-01' };
let unitId: string;
let episodeId: string;

beforeEach(async () => {
	({ unitId, episodeId } = await addWard(hospital));
});

const as = (role: keyof Hospital['people'], minutes = 0) =>
	contextOf(hospital.people[role], hospital.now + minutes * 60_000);

describe('an activity in the words of a unit', () => {
	const lines = {
		name: 'Along the hall',
		needs: ['Drain out'],
		dose: { minutes: [5, 6], repetitions: null, timesADay: [3, 4], words: '5 to 6 minutes' },
		howTo: ['Slowly.'],
		watch: ['The pulse.'],
		never: ['Never alone.']
	} satisfies WordActivity['lines'];
	const WORDED: WordActivity = { code: 'hall-walk', lines, ...AGREED };
	const entry = async () => (await listActivities(db(), unitId)).find(({ code }) => code === 'hall-walk');

	it('stands at the bedside, with who answers for it, and goes back to the catalogue', async () => {
		await wordActivity(as('admin'), unitId, WORDED);
		expect(await entry()).toMatchObject({
			name: 'Along the hall',
			howTo: ['Slowly.'],
			local: { version: 1, ...AGREED }
		});
		const board = await getNameboard(db(), hospital.people.nurse, episodeId, hospital.now);
		expect(board.wordings).toMatchObject([{ code: 'hall-walk', version: 1 }]);
		await wordActivity(as('admin', 1), unitId, { ...WORDED, lines: null });
		expect((await entry())?.local).toBeNull();
	});

	it('is on record with its number and the activity, and with no word of it', async () => {
		await wordActivity(as('admin'), unitId, WORDED);
		const [line] = await db().select().from(audit).where(eq(audit.objectId, unitId));
		expect(line).toMatchObject({
			action: 'unit.activity-worded',
			actorId: hospital.people.admin.id,
			detail: { code: 'hall-walk', version: 1, reset: false }
		});
	});

	it('of another unit stays there', async () => {
		await wordActivity(as('admin'), unitId, WORDED);
		const elsewhere = await listActivities(db(), hospital.units.ward);
		expect(elsewhere.every(({ local }) => local === null)).toBe(true);
	});

	it('is refused where there is nothing to go back from, for other roles, and for no unit', async () => {
		const reset = { ...WORDED, lines: null };
		await expect(wordActivity(as('admin'), unitId, reset)).rejects.toMatchObject({ code: 'invalid' });
		await expect(wordActivity(as('physician'), unitId, WORDED)).rejects.toMatchObject({
			code: 'not-allowed'
		});
		await expect(wordActivity(as('admin'), newId(), WORDED)).rejects.toMatchObject({ code: 'not-found' });
	});
});
