import { beforeEach, describe, expect, it } from 'vitest';
import { staleKeys } from '$lib/domain/live/events';
import type { LooseEnd } from '$lib/domain/loose-ends/loose-ends';
import { db } from '$lib/server/db';
import { closeEpisode } from '$lib/server/episodes/close';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { eventsAfter } from '$lib/server/live/log';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { attendVisit, bookVisits, cancelVisit, confirmVisit, missVisit } from '$lib/server/visits/actions';
import { closeDay, openDay } from '$lib/server/visits/closed-days';
import { listVisits, visitItemsOf } from '$lib/server/visits/queries';
import { rescheduleVisit } from '$lib/server/visits/reschedule';
import { addPatient, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
type Who = keyof Hospital['people'];
const DAY = 24 * 60 * 60 * 1000;
/** Tuesday 17 March 2026, 10:00 in Dublin, two weeks after the day of the fixture. */
const START = Date.parse('2026-03-17T10:00:00Z');
const NAME = 'Saint Patrick’s Day';

let episodeId: string;
let id: string;

const as = (role: Who, now = hospital.now) => contextOf(hospital.people[role], now);
async function book(startsAt = START): Promise<string> {
	const input = { kind: 'single', startsAt, minutes: 45, place: 'East Gym' } as const;
	return (await bookVisits(as('coordinator'), episodeId, input)).result.items[0]?.id ?? '';
}
beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
	id = await book();
});

async function ends(role: Who, kind: LooseEnd['kind'], now = hospital.now) {
	const { mine, theirs } = await looseEndsOf(db(), hospital.people[role], now);
	return [...mine, ...theirs].filter((end) => end.episodeId === episodeId && end.kind === kind);
}

describe('a visit whose day is closed after it was booked', () => {
	let dayId: string;
	const close = async () => {
		dayId = (await closeDay(as('coordinator'), { date: '2026-03-17', name: NAME })).result.id;
	};
	const reopen = () => openDay(as('coordinator'), dayId);
	const closedDays = async () => {
		const [item] = (await visitItemsOf(hospital.people.therapist, episodeId)).items;
		const [line] = (await getNameboard(db(), hospital.people.therapist, episodeId, hospital.now)).visits;
		const range = { from: START - DAY, to: START + DAY };
		const listed = (await listVisits(hospital.people.therapist, range)).items.find((each) => each.id === id);
		return [item?.closedDay, line?.closedDay, listed?.closedDay];
	};

	it('says so wherever it is shown, until the day is opened again', async () => {
		expect(await closedDays()).toEqual([null, null, null]);
		await close();
		expect(await closedDays()).toEqual([NAME, NAME, NAME]);
		await reopen();
		expect(await closedDays()).toEqual([null, null, null]);
	});

	it('tells the open page of its patient', async () => {
		await close();
		const told = (await eventsAfter(db(), 0)).findLast((event) => event.episodeId === episodeId);
		await reopen();
		expect(told).toMatchObject({ topic: 'visit', kind: 'day-closed', id });
		expect(told && staleKeys(told)).toContainEqual(['episode', episodeId]);
	});

	it('waits on the coordinator alone, and not for a yes as well', async () => {
		await close();
		expect(await ends('coordinator', 'visit-closed-day')).toMatchObject([
			{ id, title: `The visit stands on a closed day, ${NAME}: find another time` }
		]);
		expect(await ends('therapist', 'visit-closed-day')).toEqual([]);
		expect(await ends('coordinator', 'visit-unconfirmed', START - 60_000)).toEqual([]);
		await reopen();
		expect(await ends('coordinator', 'visit-unconfirmed', START - 60_000)).toHaveLength(1);
	});

	it.each<[string, () => Promise<unknown>, number]>([
		['confirmed by the patient', () => confirmVisit(as('coordinator'), id), 1],
		['moved', () => rescheduleVisit(as('coordinator'), id, { startsAt: START + DAY }), 0],
		['cancelled', () => cancelVisit(as('coordinator'), id, 'Closed.'), 0]
	])('and is %s meanwhile', async (_, deed, left) => {
		await close();
		await deed();
		const open = await ends('coordinator', 'visit-closed-day');
		await reopen();
		expect(open).toHaveLength(left);
		expect(await ends('coordinator', 'visit-closed-day')).toEqual([]);
	});
});

describe('a visit of an earlier day that nobody has marked', () => {
	// Midnight in Dublin, in winter the same as in UTC.
	it.each([
		['the last minute of its day', '2026-03-17T23:59:59.999Z', 0],
		['the midnight after it', '2026-03-18T00:00:00.000Z', 1],
		['two weeks later', '2026-03-31T12:00:00.000Z', 1]
	])('at %s', async (_, now, count) => {
		for (const role of ['coordinator', 'therapist'] as const) {
			expect(await ends(role, 'visit-unmarked', Date.parse(now))).toHaveLength(count);
		}
		expect(await ends('nurse', 'visit-unmarked', Date.parse(now))).toEqual([]);
	});

	it.each<[string, (now: number) => Promise<unknown>]>([
		['attended', (now) => attendVisit(as('coordinator', now), id)],
		['missed', (now) => missVisit(as('therapist', now), id, null)],
		['of an episode that is closed', (now) => closeEpisode(as('nurse', now), episodeId, 'home')]
	])('is none any more once it is %s', async (_, deed) => {
		const later = START + 2 * DAY;
		expect(await ends('coordinator', 'visit-unmarked', later)).toMatchObject([{ id }]);
		await deed(later);
		expect(await ends('coordinator', 'visit-unmarked', later)).toEqual([]);
	});

	it('is still owed when it was confirmed', async () => {
		await confirmVisit(as('coordinator'), id);
		expect(await ends('coordinator', 'visit-unmarked', START + DAY)).toHaveLength(1);
	});
});
