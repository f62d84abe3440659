import { beforeEach, describe, expect, it } from 'vitest';
import {
	askClearance,
	giveClearance,
	holdClearance,
	withdrawClearance,
	withholdClearance
} from '$lib/server/clearances/actions';
import { getClearance } from '$lib/server/clearances/queries';
import type { PersonContext } from '$lib/server/context';
import { db } from '$lib/server/db';
import { operations } from '$lib/server/db/schema';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { newId } from '$lib/server/ids';
import { addPatient, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
let episodeId: string;

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
});

const DAY = 24 * 3600;
const as = (role: keyof Hospital['people'], seconds = 0) =>
	contextOf(hospital.people[role], hospital.now + seconds * 1000);
const shown = (id: string, seconds = 0) =>
	getClearance(db(), hospital.people.nurse, id, hospital.now + seconds * 1000);

async function asked(kind: 'stairs' | 'arm-stage' | 'out-of-bed' = 'stairs'): Promise<string> {
	const { result } = await askClearance(as('therapist'), episodeId, { kind, question: 'May it start?' });
	return result.id;
}

describe('a decision by somebody who saw an earlier state', () => {
	const give = (context: PersonContext, id: string, seen: string | null) =>
		giveClearance(context, id, { limits: { helpers: 'one' } }, { decidedAt: seen });
	const withhold = (context: PersonContext, id: string, seen: string | null) =>
		withholdClearance(context, id, 'Not today.', { decidedAt: seen });
	const hold = (context: PersonContext, id: string, seen: string | null) =>
		holdClearance(context, id, 'Fell yesterday.', { decidedAt: seen });
	const withdraw = (context: PersonContext, id: string, seen: string | null) =>
		withdrawClearance(context, id, 'Click felt.', { decidedAt: seen });

	it.each([
		['give', give],
		['withhold', withhold],
		['hold', hold],
		['withdraw', withdraw]
	])('by "%s" is refused and names who was faster', async (_, move) => {
		const id = await asked();
		await giveClearance(as('physician', 60), id, {}, { decidedAt: null });
		await expect(move(as('surgeon', 61), id, null)).rejects.toMatchObject({
			code: 'wrong-state',
			status: 409,
			extra: {
				state: 'given',
				decidedBy: hospital.people.physician.name,
				decidedAt: '2026-03-03T09:01:00.000Z'
			}
		});
		expect(await shown(id)).toMatchObject({
			state: 'given',
			decidedBy: hospital.people.physician.name
		});
	});

	it('stands when nothing has come between', async () => {
		const id = await asked();
		await give(as('physician', 60), id, null);
		const { decidedAt } = await shown(id);
		expect((await hold(as('surgeon', 90), id, decidedAt)).result.state).toBe('on-hold');
	});
});

describe('a decision by somebody who does not say what they saw', () => {
	const refused = (decidedBy: string, state: string, decidedAt: string) => ({
		code: 'wrong-state',
		status: 409,
		extra: { state, decidedBy, decidedAt }
	});
	const AT = '2026-03-03T09:01:00.000Z';

	it('at the same time as another: one answers, the other is told who was faster', async () => {
		const id = await asked();
		const given = [
			[hospital.people.surgeon, 'given-with-limits', { limits: { helpers: 'two' } }],
			[hospital.people.physician, 'given', {}]
		] as const;
		const told = await Promise.allSettled(
			given.map(([person, , input]) => giveClearance(contextOf(person, hospital.now + 60_000), id, input))
		);
		const winner = told.findIndex(({ status }) => status === 'fulfilled');
		const [person, state] = given[winner] ?? given[0];
		expect(told[winner]).toMatchObject({ value: { result: { id, state } } });
		expect(told[1 - winner]).toMatchObject({ reason: refused(person.name, state, AT) });
		expect(await shown(id)).toMatchObject({ state, decidedBy: person.name, decidedAt: AT });
	});

	it.each([
		['given', {}],
		['given-with-limits', { limits: { helpers: 'two' } }]
	] as const)('does not change what is %s; one who says so does', async (state, input) => {
		const id = await asked();
		await giveClearance(as('physician', 60), id, input);
		const again = (decidedAt?: string) =>
			giveClearance(as('surgeon', 90), id, { limits: { helpers: 'one' } }, { decidedAt });
		const { name } = hospital.people.physician;
		await expect(again()).rejects.toMatchObject(refused(name, state, AT));
		await expect(again('2026-03-03T09:00:59.999Z')).rejects.toMatchObject(refused(name, state, AT));
		await expect(again('a minute past nine')).rejects.toMatchObject(refused(name, state, AT));
		expect((await again('2026-03-03T10:01:00+01:00')).result.state).toBe('given-with-limits');
	});

	it('gives what is on hold, and takes back what was given', async () => {
		const id = await asked();
		await giveClearance(as('physician', 60), id, {});
		await holdClearance(as('surgeon', 70), id, 'Fell yesterday.');
		expect((await giveClearance(as('surgeon', 80), id, {})).result.state).toBe('given');
		expect((await withdrawClearance(as('surgeon', 90), id, 'Click felt.')).result.state).toBe('withdrawn');
	});
});

describe('what a clearance permits now', () => {
	const today = async (seconds = 0) =>
		getNameboard(db(), hospital.people.nurse, episodeId, hospital.now + seconds * 1000);

	it('ends after its review date, not on it', async () => {
		const id = await asked('out-of-bed');
		await giveClearance(as('surgeon'), id, { reviewOn: '2026-03-04' });
		const [onTheDay, after] = [await today(DAY), await today(2 * DAY)];
		expect(onTheDay.mayDoNow?.chair).toBe('one');
		expect(after.mayDoNow?.chair).toBe('not');
	});

	it('does not grow because somebody asks again', async () => {
		await withholdClearance(as('surgeon'), await asked('out-of-bed'), 'Bleeding.');
		await asked('out-of-bed');
		expect((await today()).mayDoNow).toMatchObject({ chair: 'not', corridor: 'not' });
	});

	it('is nothing once a later operation has begun', async () => {
		const id = await asked('arm-stage');
		await giveClearance(as('surgeon'), id, {});
		expect(await shown(id)).toMatchObject({ state: 'given', current: true });
		await db()
			.insert(operations)
			.values({
				id: newId(),
				episodeId,
				procedure: 'Re-opening for bleeding',
				approach: 'sternotomy',
				operatedAt: hospital.now + 1000,
				createdAt: hospital.now
			});
		expect(await shown(id, 0)).toMatchObject({ current: true });
		expect(await shown(id, 1)).toMatchObject({ state: 'given', current: false });
		expect((await today(1)).clearances).toMatchObject([{ id, current: false }]);
	});
});
