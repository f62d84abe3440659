import { describe, expect, it } from 'vitest';
import type { BookVisits } from '$lib/domain/visits/forms';
import { db } from '$lib/server/db';
import { settings, visits } from '$lib/server/db/schema';
import { bookVisits, cancelVisit } from '$lib/server/visits/actions';
import { PLACES_SETTING } from '$lib/server/visits/room';
import { addPatient, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();

const coordinator = () => contextOf(hospital.people.coordinator);
const newPatient = async () => (await addPatient({ unitId: hospital.units.ward })).episodeId;

async function book(episodeId: string, at: string, place = 'East Gym', minutes = 60) {
	const input = { kind: 'single', startsAt: Date.parse(at), minutes, place } as const;
	const { result } = await bookVisits(coordinator(), episodeId, input);
	return result.items[0]?.id ?? '';
}

describe('a second visit of the same patient', () => {
	it.each([
		['2026-03-09T09:01:00Z', 'Tern Ward'],
		['2026-03-09T10:00:00Z', 'East Gym'],
		['2026-03-09T10:59:00Z', 'East Gym']
	])('at %s in %s is refused and says when the first is', async (at, place) => {
		const episodeId = await newPatient();
		const id = await book(episodeId, '2026-03-09T10:00:00Z', 'Heron Unit');
		const before = await db().$count(visits);
		await expect(book(episodeId, at, place)).rejects.toMatchObject({
			code: 'visit-overlaps',
			status: 409,
			detail: expect.stringContaining('10:00'),
			extra: { other: { id, startsAt: '2026-03-09T10:00:00.000Z', minutes: 60 } }
		});
		expect(await db().$count(visits)).toBe(before);
		await cancelVisit(coordinator(), id, null);
		expect(await book(episodeId, at, place)).not.toBe('');
	});

	it('may begin as the first ends', async () => {
		const episodeId = await newPatient();
		await book(episodeId, '2026-03-10T10:00:00Z');
		expect(await book(episodeId, '2026-03-10T11:00:00Z')).not.toBe('');
	});

	it('in the middle of a series refuses the whole of it', async () => {
		const episodeId = await newPatient();
		await book(episodeId, '2026-03-18T10:30:00Z');
		const before = await db().$count(visits);
		const input: BookVisits = {
			kind: 'series',
			from: '2026-03-16',
			weekdays: ['mon', 'wed'],
			time: '10:00',
			count: 4,
			minutes: 60,
			place: 'East Gym'
		};
		await expect(bookVisits(coordinator(), episodeId, input)).rejects.toMatchObject({
			code: 'visit-overlaps',
			extra: { startsAt: '2026-03-18T10:00:00.000Z' }
		});
		expect(await db().$count(visits)).toBe(before);
	});
});

describe('a place', () => {
	async function fill(count: number, at: string, place: string) {
		for (let n = 0; n < count; n += 1) {
			await book(await newPatient(), at, place);
		}
	}

	it('takes any number where nobody has said how many', async () => {
		await fill(13, '2026-03-11T10:00:00Z', 'East Gym');
		expect(await book(await newPatient(), '2026-03-11T10:00:00Z')).not.toBe('');
	});

	it('takes as many as the setting says', async () => {
		const value = { [hospital.units.gym]: 2 };
		await db().insert(settings).values({ key: PLACES_SETTING, value, changedAt: hospital.now });
		await fill(2, '2026-03-12T10:00:00Z', 'East Gym');
		await expect(book(await newPatient(), '2026-03-12T10:30:00Z')).rejects.toMatchObject({
			code: 'place-full',
			extra: { places: 2 }
		});
		expect(await book(await newPatient(), '2026-03-12T11:00:00Z')).not.toBe('');
	});
});
