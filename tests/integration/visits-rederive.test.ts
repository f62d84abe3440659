import { and, asc, eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { audit, outbox, visits } from '$lib/server/db/schema';
import { bookVisits, confirmVisit } from '$lib/server/visits/actions';
import { rederiveVisits } from '$lib/server/visits/rederive';
import { HOSPITAL_NOW, addPatient, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

/** A start on a machine whose zone data say otherwise than those by which visits were booked. */

const hospital = await openHospital({ PORT: '4300' });
const MONDAY = Date.parse('2026-03-09T10:00:00Z');
const HOUR = 3_600_000;
const coordinator = contextOf(hospital.people.coordinator);

/** Booked for ten o'clock, and stored as older rules had it: an hour off. */
async function booked(startsAt = MONDAY) {
	const made = await addPatient({ unitId: hospital.units.ward, email: 'zone@post.example' });
	const input = { kind: 'single', startsAt, minutes: 45, place: 'East Gym' } as const;
	const { result } = await bookVisits(coordinator, made.episodeId, input);
	return result.items[0]?.id ?? '';
}
const rowOf = async (id: string) => (await db().select().from(visits).where(eq(visits.id, id)))[0];
const shift = (id: string, startsAt: number) =>
	db().update(visits).set({ startsAt }).where(eq(visits.id, id));
const about = (id: string, kind: 'reminder' | 'visit') =>
	db()
		.select()
		.from(outbox)
		.where(and(eq(outbox.refId, id), eq(outbox.kind, kind)))
		.orderBy(asc(outbox.nextAt), asc(outbox.id));

describe('visits after a change of the rules of their zone', () => {
	it('begin when the wall shows what was agreed; reminders and calendars follow, no text goes', async () => {
		const id = await booked();
		await confirmVisit(coordinator, id);
		await shift(id, MONDAY + HOUR);
		expect(await rederiveVisits(HOSPITAL_NOW)).toBe(1);
		expect(await rowOf(id)).toMatchObject({
			startsAt: MONDAY,
			localTime: '10:00',
			state: 'confirmed',
			sequence: 1
		});
		expect((await about(id, 'reminder')).map(({ state, expiresAt }) => [state, expiresAt])).toEqual([
			['ready', Date.parse('2026-03-08T17:00:00Z')],
			['ready', MONDAY]
		]);
		const news = await about(id, 'visit');
		expect(news.map(({ channel }) => channel)).toEqual(['mail', 'mail']);
		expect(news.map(({ calendar }) => /SEQUENCE:\d/.exec(calendar ?? '')?.[0]).toSorted()).toEqual([
			'SEQUENCE:0',
			'SEQUENCE:1'
		]);
		const rows = await db().select().from(audit).where(eq(audit.objectId, id));
		expect(rows.at(-1)).toMatchObject({
			action: 'visit.moved',
			actorKind: 'system',
			detail: { cause: 'zone-rules' }
		});
		expect(await rederiveVisits(HOSPITAL_NOW)).toBe(0);
	});

	it.each([
		['in the hour that happens twice, at the second of the two', Date.parse('2026-10-25T01:30:00Z'), null],
		['that have begun', MONDAY, HOSPITAL_NOW],
		['that are as agreed', MONDAY + HOUR, null]
	])('%s, stay', async (_, startsAt, moved) => {
		const id = await booked(startsAt);
		if (moved !== null) {
			await shift(id, moved);
		}
		expect(await rederiveVisits(HOSPITAL_NOW)).toBe(0);
		expect(await rowOf(id)).toMatchObject({ startsAt: moved ?? startsAt, sequence: 0 });
	});
});
