import { and, asc, eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Person } from '$lib/domain/access/actor';
import type { Role } from '$lib/domain/core/codes';
import type { BookVisits } from '$lib/domain/visits/forms';
import { db } from '$lib/server/db';
import { audit, entries, episodes, liveEvents, outbox, settings, visits } from '$lib/server/db/schema';
import {
	attendVisit,
	bookVisits,
	cancelVisit,
	confirmVisit,
	followUpVisit,
	missVisit,
	reopenVisit
} from '$lib/server/visits/actions';
import { PLACES_SETTING } from '$lib/server/visits/room';
import { listVisits, visitsOfEpisode } from '$lib/server/visits/queries';
import { POST as postVisits } from '../../src/routes/api/episodes/[id]/visits/+server';
import { GET as getVisits } from '../../src/routes/api/visits/+server';
import { POST as postAttend } from '../../src/routes/api/visits/[id]/attend/+server';
import { POST as postCancel } from '../../src/routes/api/visits/[id]/cancel/+server';
import { POST as postConfirm } from '../../src/routes/api/visits/[id]/confirm/+server';
import { POST as postMiss } from '../../src/routes/api/visits/[id]/miss/+server';
import { callRoute } from '../support/call';
import { freshDatabase } from '../support/database';
import { testEnvironment } from '../support/environment';
import {
	HOSPITAL_NOW,
	addPatient,
	addReferral,
	contextOf,
	makeHospital,
	type Hospital
} from '../support/hospital';

const HOUR = 60 * 60 * 1000;
const DAY = 24 * HOUR;
const at = (text: string) => Date.parse(text);

let hospital: Hospital;
let cleanUp: () => void;

beforeAll(async () => {
	const environment = testEnvironment({ PUBLIC_URL: 'https://ropewalk.saltmarsh.example' });
	const database = await freshDatabase();
	hospital = await makeHospital();
	// Most tests book for the same hour; how many a place holds is tested for itself.
	const value = { [hospital.units.gym]: 1000 };
	await db().insert(settings).values({ key: PLACES_SETTING, value, changedAt: HOSPITAL_NOW });
	cleanUp = () => {
		database.close();
		environment.remove();
	};
});
afterAll(() => cleanUp());

const coordinator = () => contextOf(hospital.people.coordinator);

/** Monday 9 March 2026, 10:00 in Dublin. */
const single = (change: object = {}): BookVisits => ({
	kind: 'single',
	startsAt: at('2026-03-09T10:00:00Z'),
	minutes: 45,
	place: 'East Gym',
	...change
});

const series = (change: object = {}): BookVisits => ({
	kind: 'series',
	from: '2026-03-20',
	weekdays: ['mon', 'wed', 'fri'],
	time: '10:00',
	count: 36,
	minutes: 60,
	place: hospital.units.gym,
	...change
});

async function newEpisode(change: Partial<Parameters<typeof addPatient>[0]> = {}) {
	return addPatient({ unitId: hospital.units.ward, ...change });
}

async function booked(change: object = {}) {
	const made = await newEpisode();
	const { result } = await bookVisits(coordinator(), made.episodeId, single(change));
	const id = result.items[0]?.id ?? '';
	return { ...made, id };
}

async function visitRow(id: string) {
	const [row] = await db().select().from(visits).where(eq(visits.id, id));
	return row;
}

async function messagesOf(visitId: string, kind: 'reminder' | 'mail') {
	return db()
		.select()
		.from(outbox)
		.where(and(eq(outbox.refId, visitId), eq(outbox.kind, kind)))
		.orderBy(asc(outbox.nextAt));
}

describe('booking one visit', () => {
	it('keeps wall time, zone and instant, and answers the visit', async () => {
		const { episodeId } = await newEpisode();
		const { result, replayed } = await bookVisits(coordinator(), episodeId, single());
		expect(replayed).toBe(false);
		expect(result.items).toEqual([
			{
				id: expect.any(String),
				startsAt: '2026-03-09T10:00:00.000Z',
				minutes: 45,
				place: 'East Gym',
				state: 'planned'
			}
		]);
		expect(await visitRow(result.items[0]?.id ?? '')).toMatchObject({
			localDate: '2026-03-09',
			localTime: '10:00',
			zone: 'Europe/Dublin',
			unitId: hospital.units.gym,
			seriesId: null,
			bookedBy: hospital.people.coordinator.id,
			bookedAt: HOSPITAL_NOW
		});
		expect(await visitsOfEpisode(db(), episodeId)).toMatchObject(result.items);
	});

	it('plans its reminders for two days and one day before at 17:00', async () => {
		const { id, patient } = await booked();
		const reminders = await messagesOf(id, 'reminder');
		expect(reminders.map(({ nextAt, expiresAt }) => [nextAt, expiresAt])).toEqual([
			[at('2026-03-07T17:00:00Z'), at('2026-03-08T17:00:00Z')],
			[at('2026-03-08T17:00:00Z'), at('2026-03-09T10:00:00Z')]
		]);
		expect(new Set(reminders.map(({ patientId, state }) => `${patientId} ${state}`))).toEqual(
			new Set([`${patient.id} ready`])
		);
		expect(reminders[0]?.body).toContain('Mon 9 Mar 10:00, East Gym. Reply YES or NO.');
	});

	it('tells the thread, the audit, the stream and the referrer, with a link and no name', async () => {
		const { episodeId, patient } = await newEpisode();
		const { surgeon, physician } = hospital.people;
		await addReferral({ episodeId, askedBy: physician.id, askedAt: HOSPITAL_NOW - 2 * DAY });
		const { threadId } = await addReferral({ episodeId, askedBy: surgeon.id, askedAt: HOSPITAL_NOW - DAY });
		const { result } = await bookVisits(coordinator(), episodeId, single());
		const id = result.items[0]?.id ?? '';
		const [entry] = await db().select().from(entries).where(eq(entries.threadId, threadId));
		expect(entry).toMatchObject({ kind: 'event', refKind: 'visit', refId: id, seq: 1 });
		expect(entry?.body).toBe('Visit booked: Mon 9 Mar 10:00, East Gym.');
		const [row] = await db().select().from(audit).where(eq(audit.episodeId, episodeId));
		expect(row).toMatchObject({ action: 'visit.booked', objectId: id, detail: { count: 1 } });
		const events = await db().select().from(liveEvents).where(eq(liveEvents.episodeId, episodeId));
		expect(events.map(({ topic, kind, subjectId }) => [topic, kind, subjectId])).toEqual([
			['visit', 'booked', id],
			['thread', 'entry', threadId]
		]);
		const [mail, ...more] = await messagesOf(id, 'mail');
		expect(more).toEqual([]);
		expect(mail).toMatchObject({ userId: surgeon.id, channel: 'mail', expiresAt: HOSPITAL_NOW + DAY });
		expect(mail?.body).toContain(`https://ropewalk.saltmarsh.example/patients/${episodeId}/visits`);
		expect(`${mail?.subject} ${mail?.body}`).not.toContain(patient.name.split(' ')[1]);
	});

	it('sends no mail to somebody about their own booking', async () => {
		const { episodeId } = await newEpisode();
		await addReferral({ episodeId, askedBy: hospital.people.therapist.id });
		const { result } = await bookVisits(contextOf(hospital.people.therapist), episodeId, single());
		expect(await messagesOf(result.items[0]?.id ?? '', 'mail')).toEqual([]);
	});

	it('leaves out the reminders that are past', async () => {
		const { id } = await booked({ startsAt: HOSPITAL_NOW + 2 * HOUR });
		expect(await messagesOf(id, 'reminder')).toEqual([]);
	});

	it.each([
		['by id', () => hospital.units.gym],
		['by exact name', () => 'East Gym']
	])('finds the place %s', async (_, place) => {
		const { id } = await booked({ place: place() });
		expect(await visitRow(id)).toMatchObject({ unitId: hospital.units.gym, place: 'East Gym' });
	});

	it.each([
		['a place that is none', { place: 'east gym' }, '/place', "place is 'east gym'"],
		['the past', { startsAt: HOSPITAL_NOW - 1 }, '/startsAt', 'must not be in the past'],
		['more than two years ahead', { startsAt: at('2028-03-04T10:00:00Z') }, '/startsAt', '731 days']
	])('refuses %s', async (_, change, pointer, words) => {
		const { episodeId } = await newEpisode();
		await expect(bookVisits(coordinator(), episodeId, single(change))).rejects.toMatchObject({
			code: 'invalid',
			extra: { errors: [{ pointer, message: expect.stringContaining(words) }] }
		});
		expect(await visitsOfEpisode(db(), episodeId)).toEqual([]);
	});

	it.each([
		['this very instant', HOSPITAL_NOW],
		['the last day of two years', at('2028-03-03T10:00:00Z')]
	])('books %s', async (_, startsAt) => {
		const { id } = await booked({ startsAt });
		expect(await visitRow(id)).toMatchObject({ startsAt });
	});

	it('refuses a closed episode', async () => {
		const { episodeId } = await newEpisode();
		await db().update(episodes).set({ closedAt: HOSPITAL_NOW }).where(eq(episodes.id, episodeId));
		await expect(bookVisits(coordinator(), episodeId, single())).rejects.toMatchObject({
			code: 'wrong-state'
		});
	});
});

describe('booking a series', () => {
	it('keeps the time of day over the change of the clock', async () => {
		const { episodeId } = await newEpisode();
		await addReferral({ episodeId, askedBy: hospital.people.surgeon.id });
		const { result } = await bookVisits(coordinator(), episodeId, series());
		expect(result.items).toHaveLength(36);
		// Clocks in Dublin go forward on Sunday 29 March 2026.
		expect(result.items.slice(0, 6).map(({ startsAt }) => startsAt)).toEqual([
			'2026-03-20T10:00:00.000Z',
			'2026-03-23T10:00:00.000Z',
			'2026-03-25T10:00:00.000Z',
			'2026-03-27T10:00:00.000Z',
			'2026-03-30T09:00:00.000Z',
			'2026-04-01T09:00:00.000Z'
		]);
		const rows = await db().select().from(visits).where(eq(visits.episodeId, episodeId));
		expect(new Set(rows.map(({ seriesId }) => seriesId)).size).toBe(1);
		expect(new Set(rows.map(({ localTime }) => localTime))).toEqual(new Set(['10:00']));
		for (const { id } of result.items) {
			expect(await messagesOf(id, 'reminder')).toHaveLength(1);
		}
		const mails = await Promise.all(result.items.map(({ id }) => messagesOf(id, 'mail')));
		expect(mails.flat()).toHaveLength(1);
		const written = await db()
			.select()
			.from(entries)
			.where(eq(entries.refId, result.items[0]?.id ?? ''));
		expect(written.map(({ body }) => body)).toEqual([
			'36 visits booked, from Fri 20 Mar 10:00 to Wed 10 Jun 10:00, East Gym.'
		]);
		expect(await db().$count(audit, eq(audit.episodeId, episodeId))).toBe(1);
	});

	it.each([
		['in the past', { from: '2026-03-01' }, '/series/from'],
		['at a place that is none', { place: 'Nowhere' }, '/series/place'],
		['that ends too late', { from: '2028-02-28', count: 60 }, '/series/from']
	])('refuses one %s', async (_, change, pointer) => {
		const { episodeId } = await newEpisode();
		await expect(bookVisits(coordinator(), episodeId, series(change))).rejects.toMatchObject({
			extra: { errors: [{ pointer }] }
		});
		expect(await visitsOfEpisode(db(), episodeId)).toEqual([]);
	});
});

describe('moving a visit', () => {
	it.each([
		['confirm', 'confirmed', confirmVisit],
		['cancel', 'cancelled', cancelVisit],
		['attend', 'attended', attendVisit],
		['miss', 'missed', missVisit]
	] as const)('%s: %s, in thread, audit and stream', async (_, state, move) => {
		const { id, episodeId } = await booked();
		const { threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id });
		const { result } = await move(coordinator(), id, null);
		expect(result).toEqual({ id, state, ...(state === 'cancelled' ? { told: ['sms'] } : {}) });
		expect(await visitRow(id)).toMatchObject({ state, decidedAt: HOSPITAL_NOW, patientCancelledAt: null });
		const [entry] = await db().select().from(entries).where(eq(entries.threadId, threadId));
		expect(entry).toMatchObject({ kind: 'event', refId: id, authorId: hospital.people.coordinator.id });
		expect(await db().$count(audit, eq(audit.action, `visit.${state}`))).toBeGreaterThan(0);
		expect(await db().$count(liveEvents, and(eq(liveEvents.subjectId, id), eq(liveEvents.kind, state)))).toBe(
			1
		);
	});

	it.each([
		['confirm', confirmVisit, 'ready', 'Reply NO if you cannot come'],
		['cancel', cancelVisit, 'cancelled', 'Reply YES or NO'],
		['attend', attendVisit, 'cancelled', 'Reply YES or NO'],
		['miss', missVisit, 'cancelled', 'Reply YES or NO']
	] as const)('%s keeps or drops the reminders', async (_, move, state, words) => {
		const { id } = await booked();
		await move(coordinator(), id, null);
		const reminders = await messagesOf(id, 'reminder');
		expect(reminders.map((row) => row.state)).toEqual([state, state]);
		expect(reminders.every(({ body }) => body.includes(words))).toBe(true);
	});

	it('keeps the reason, and corrects attended and missed with one', async () => {
		const { id } = await booked();
		await missVisit(coordinator(), id, 'Bus broke down');
		expect(await visitRow(id)).toMatchObject({ state: 'missed', reason: 'Bus broke down' });
		await attendVisit(coordinator(), id, 'Came by taxi.');
		expect(await visitRow(id)).toMatchObject({ state: 'attended', reason: 'Came by taxi.' });
	});

	it('changes nothing on record without a reason', async () => {
		const { id } = await booked();
		await attendVisit(coordinator(), id);
		const refused = { code: 'invalid', status: 422, extra: { errors: [{ pointer: '/reason' }] } };
		await expect(missVisit(coordinator(), id, null)).rejects.toMatchObject(refused);
		expect(await visitRow(id)).toMatchObject({ state: 'attended' });
	});

	it('takes back what was marked by mistake, on record with both states and why', async () => {
		const { id, episodeId } = await booked();
		const { threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id });
		await missVisit(coordinator(), id, null);
		const { result } = await reopenVisit(coordinator(), id, 'The wrong row.');
		expect(result).toEqual({ id, state: 'planned' });
		const [row] = await db()
			.select()
			.from(audit)
			.where(and(eq(audit.objectId, id), eq(audit.action, 'visit.reopened')));
		expect(row?.detail).toEqual({ by: 'staff', from: 'missed' });
		const said = await db().select().from(entries).where(eq(entries.threadId, threadId));
		expect(said.map(({ body }) => body).at(-1)).toContain('planned again. Reason: The wrong row.');
		await expect(reopenVisit(coordinator(), id, 'Again.')).rejects.toMatchObject({ code: 'wrong-state' });
	});

	it('refuses what the state does not allow, and says the state', async () => {
		const { id } = await booked();
		await cancelVisit(coordinator(), id, null);
		await expect(confirmVisit(coordinator(), id)).rejects.toMatchObject({
			code: 'wrong-state',
			extra: { state: 'cancelled' }
		});
	});

	it('of two at once only one comes first', async () => {
		const { id } = await booked();
		const both = await Promise.allSettled([
			cancelVisit(coordinator(), id, null),
			cancelVisit(coordinator(), id, null)
		]);
		expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
	});
});

describe('a visit that the patient cancelled', () => {
	async function cancelledByPatient() {
		const made = await booked();
		await db()
			.update(visits)
			.set({ state: 'cancelled', patientCancelledAt: HOSPITAL_NOW, reason: 'patient' })
			.where(eq(visits.id, made.id));
		return made;
	}

	it('is followed up once, by whoever says so', async () => {
		const { id } = await cancelledByPatient();
		await followUpVisit(coordinator(), id);
		expect(await visitRow(id)).toMatchObject({
			followedUpAt: HOSPITAL_NOW,
			followedUpBy: hospital.people.coordinator.id
		});
		await expect(followUpVisit(coordinator(), id)).rejects.toMatchObject({ code: 'wrong-state' });
	});

	it('is followed up by another booking', async () => {
		const { id, episodeId } = await cancelledByPatient();
		await bookVisits(coordinator(), episodeId, single({ startsAt: at('2026-03-10T10:00:00Z') }));
		expect(await visitRow(id)).toMatchObject({ followedUpAt: HOSPITAL_NOW });
	});

	it('that staff cancelled needs none', async () => {
		const { id } = await booked();
		await cancelVisit(coordinator(), id, null);
		await expect(followUpVisit(coordinator(), id)).rejects.toMatchObject({ code: 'wrong-state' });
	});
});

describe('the list of visits', () => {
	const week = { from: at('2026-07-06T00:00:00Z'), to: at('2026-07-13T00:00:00Z') };

	it('holds those of the range and of one’s units, with patient and reminders, by page', async () => {
		const { episodeId, patient } = await newEpisode({ name: 'Nuala Ferrybank' });
		const inRange = ['2026-07-06T00:00:00Z', '2026-07-08T09:00:00Z', '2026-07-12T23:59:59Z'];
		const outside = ['2026-07-05T23:59:59Z', '2026-07-13T00:00:00Z'];
		const neighbour = await newEpisode();
		for (const startsAt of outside) {
			await bookVisits(coordinator(), neighbour.episodeId, single({ startsAt: at(startsAt) }));
		}
		for (const startsAt of inRange) {
			await bookVisits(coordinator(), episodeId, single({ startsAt: at(startsAt) }));
		}
		const { items, next } = await listVisits(hospital.people.nurse, week);
		expect(next).toBeNull();
		expect(items.map(({ startsAt }) => startsAt)).toEqual(
			inRange.map((text) => new Date(text).toISOString())
		);
		expect(items[1]).toMatchObject({
			episodeId,
			patient: { id: patient.id, name: 'Nuala Ferrybank', birthDate: '1958-09-05' },
			place: 'East Gym',
			state: 'planned',
			wantsFollowUp: false,
			reminders: [
				{ dueAt: '2026-07-06T16:00:00.000Z', state: 'ready', reason: null, sentAt: null },
				{ dueAt: '2026-07-07T16:00:00.000Z', state: 'ready', reason: null, sentAt: null }
			]
		});
		expect((await listVisits(hospital.outsider, week)).items).toEqual([]);
		const first = await listVisits(hospital.people.nurse, week, { limit: 2, after: null });
		const rest = await listVisits(hospital.people.nurse, week, { limit: 2, after: first.next });
		expect([...first.items, ...rest.items]).toEqual(items);
		expect(rest.next).toBeNull();
	});
});

describe('the calls of the API', () => {
	const body = { startsAt: '2026-03-09T10:00:00Z', minutes: 45, place: 'East Gym' };

	it('201 with the visits; the same key answers the same', async () => {
		const { episodeId } = await newEpisode();
		const call = () =>
			callRoute(postVisits, hospital.people.coordinator, {
				path: `/api/episodes/${episodeId}/visits`,
				params: { id: episodeId },
				body,
				key: 'k1'
			});
		const first = await call();
		const second = await call();
		expect([first.status, second.status]).toEqual([201, 201]);
		expect(second.body).toEqual(first.body);
		expect(second.headers.get('idempotency-replayed')).toBe('true');
		expect(await visitsOfEpisode(db(), episodeId)).toHaveLength(1);
	});

	it.each([
		['confirm', postConfirm, 'confirmed'],
		['cancel', postCancel, 'cancelled'],
		['attend', postAttend, 'attended'],
		['miss', postMiss, 'missed']
	])('%s answers id and state, and 409 the second time', async (_, handler, state) => {
		const { id } = await booked();
		const call = () => callRoute(handler, hospital.people.coordinator, { params: { id }, body: {} });
		expect(await call()).toMatchObject({ status: 200, body: { id, state } });
		expect(await call()).toMatchObject({ status: 409, body: { type: 'wrong-state', state } });
	});

	const PLANNERS: Role[] = ['coordinator', 'therapist'];
	const RECEIVERS: Role[] = [...PLANNERS, 'nurse'];
	it.each([
		['book', postVisits, PLANNERS, body],
		['confirm', postConfirm, PLANNERS, {}],
		['cancel', postCancel, PLANNERS, {}],
		['attend', postAttend, RECEIVERS, {}],
		['miss', postMiss, RECEIVERS, {}]
	] as const)('%s is for its roles alone', async (what, handler, roles, given) => {
		const call = async (person: Person | null) => {
			const id = what === 'book' ? (await newEpisode()).episodeId : (await booked()).id;
			return (await callRoute(handler, person, { params: { id }, body: given })).status;
		};
		for (const person of Object.values(hospital.people)) {
			const done = what === 'book' ? 201 : 200;
			expect([person.role, await call(person)]).toEqual([
				person.role,
				roles.includes(person.role) ? done : 403
			]);
		}
		expect(await call(null)).toBe(401);
		expect(await call({ ...hospital.people.coordinator, unitIds: [] })).toBe(404);
	});

	it('lists this week, or the days asked for', async () => {
		const call = (path: string) => callRoute(getVisits, hospital.people.coordinator, { path });
		expect(await call('/api/visits')).toMatchObject({ status: 200, body: { next: null } });
		const { body: answer } = await call('/api/visits?from=2026-03-09&to=2026-03-09&limit=1');
		expect(answer.items).toHaveLength(1);
		expect(answer.next).toEqual(expect.any(String));
		expect(await call('/api/visits?from=soon')).toMatchObject({
			status: 422,
			body: { errors: [{ pointer: '/from', message: expect.stringContaining("'soon'") }] }
		});
		expect(await call('/api/visits?after=nothing')).toMatchObject({
			status: 422,
			body: { errors: [{ pointer: '/after' }] }
		});
		expect((await callRoute(getVisits, hospital.people.admin, { path: '/api/visits' })).status).toBe(403);
	});
});
