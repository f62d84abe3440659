import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { outbox } from '$lib/server/db/schema';
import { attendVisit, bookVisits, cancelVisit, missVisit, reopenVisit } from '$lib/server/visits/actions';
import { visitItemsOf } from '$lib/server/visits/queries';
import { addPatient, contextOf, HOSPITAL_NOW } from '../support/hospital';
import { remindersOf } from '../support/messages';
import { openHospital } from '../support/open-hospital';

/** What becomes of the reminders of a visit that is marked by mistake, or cancelled. */

const hospital = await openHospital({ PUBLIC_URL: 'https://ropewalk.saltmarsh.example' });
const DAY = 24 * 60 * 60 * 1000;
const coordinator = (now = HOSPITAL_NOW) => contextOf(hospital.people.coordinator, now);
let episodeId: string;
let id: string;
let days = 5;

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.gym }));
	days += 1;
	const startsAt = HOSPITAL_NOW + days * DAY;
	const visit = { kind: 'single', startsAt, minutes: 45, place: 'East Gym' } as const;
	id = (await bookVisits(coordinator(), episodeId, visit)).result.items[0]?.id ?? '';
});

const reminders = () => remindersOf(id);

describe('marked by mistake and taken back', () => {
	it.each([
		['attended', attendVisit],
		['missed', missVisit]
	] as const)('as %s before its time, the patient is reminded after all', async (_, mark) => {
		const before = await reminders();
		await mark(coordinator(), id, null);
		expect((await reminders()).map(({ state }) => state)).toEqual(['cancelled', 'cancelled']);
		await reopenVisit(coordinator(), id, 'The wrong row.');
		const plan = (rows: typeof before) => rows.map(({ state, nextAt, body }) => [state, nextAt, body]);
		expect(before.map(({ state }) => state)).toEqual(['ready', 'ready']);
		expect(plan(await reminders())).toEqual(plan(before));
	});

	it.each([
		[-1, ['ready', 'ready']],
		[1, ['cancelled', 'ready']]
	])('%d ms from the hour of the first: %j', async (ms, states) => {
		const [first] = await reminders();
		await attendVisit(coordinator(), id, null);
		await reopenVisit(coordinator((first?.nextAt ?? 0) + ms), id, 'The wrong row.');
		expect((await reminders()).map(({ state }) => state)).toEqual(states);
	});
});

it('a cancelled visit keeps in its history what became of its reminders', async () => {
	const [first] = await reminders();
	await db()
		.update(outbox)
		.set({ state: 'delivered', sentAt: HOSPITAL_NOW })
		.where(eq(outbox.id, first?.id ?? ''));
	await cancelVisit(coordinator(), id, null);
	const { items } = await visitItemsOf(hospital.people.coordinator, episodeId);
	expect(items[0]?.state).toBe('cancelled');
	expect(items[0]?.reminders.map(({ state }) => state)).toEqual(['delivered', 'cancelled']);
});
