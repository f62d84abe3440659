import { and, asc, eq } from 'drizzle-orm';
import ical from 'node-ical';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ROLES } from '$lib/domain/core/codes';
import { DAY_MS, HOUR_MS } from '../support/lengths';
import { calendarId } from '$lib/domain/visits/calendar';
import { db } from '$lib/server/db';
import { audit, entries, liveEvents, outbox, patients, visits } from '$lib/server/db/schema';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { bookVisits, cancelVisit, confirmVisit } from '$lib/server/visits/actions';
import { closeDay, openDay } from '$lib/server/visits/closed-days';
import { visitItemsOf } from '$lib/server/visits/queries';
import { rescheduleVisit } from '$lib/server/visits/reschedule';
import { POST as postMove } from '../../src/routes/api/visits/[id]/move/+server';
import { callRoute } from '../support/call';
import { ScriptedChannel } from '../support/channels';
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

const at = (text: string) => Date.parse(text);
/** Monday 9 March 2026, 10:00 in Dublin, and the Wednesday after it. */
const MONDAY = at('2026-03-09T10:00:00Z');
const WEDNESDAY = at('2026-03-11T10:00:00Z');

let hospital: Hospital;
let cleanUp: () => void;

beforeAll(async () => {
	const environment = testEnvironment();
	const database = await freshDatabase();
	hospital = await makeHospital();
	cleanUp = () => {
		database.close();
		environment.remove();
	};
});
afterAll(() => cleanUp());

const coordinator = (now = HOSPITAL_NOW) => contextOf(hospital.people.coordinator, now);

async function booked(change: Partial<Parameters<typeof addPatient>[0]> = {}, startsAt = MONDAY) {
	const made = await addPatient({ unitId: hospital.units.ward, ...change });
	const { threadId } = await addReferral({ episodeId: made.episodeId, askedBy: hospital.people.surgeon.id });
	const input = { kind: 'single', startsAt, minutes: 45, place: 'East Gym' } as const;
	const { result } = await bookVisits(coordinator(), made.episodeId, input);
	return { ...made, threadId, id: result.items[0]?.id ?? '' };
}

async function messagesAbout(id: string, kind: 'reminder' | 'visit') {
	return db()
		.select()
		.from(outbox)
		.where(and(eq(outbox.refId, id), eq(outbox.kind, kind)))
		.orderBy(asc(outbox.createdAt), asc(outbox.nextAt), asc(outbox.channel));
}

const rowOf = async (id: string) => (await db().select().from(visits).where(eq(visits.id, id)))[0];

/** Sends what is due at that moment, and says what went to this patient. */
async function settle(now: number, patient: { phone: string }, email = 'nobody') {
	const [sms, mail] = [new ScriptedChannel(), new ScriptedChannel()];
	await new OutboxWorker({ channels: { sms, mail }, now: () => now }).settle();
	return {
		texts: sms.sent.filter(({ to }) => to === patient.phone),
		mails: mail.sent.filter(({ to }) => to === email)
	};
}

describe('moving a visit', () => {
	it('keeps it the same visit: its identifier, a higher sequence, and the yes is asked for anew', async () => {
		const { id, threadId, episodeId } = await booked();
		await confirmVisit(coordinator(), id);
		const { result } = await rescheduleVisit(coordinator(), id, {
			startsAt: WEDNESDAY,
			minutes: 60,
			place: 'Tern Ward',
			reason: 'The gym is painted.'
		});
		expect(result).toEqual({
			id,
			startsAt: '2026-03-11T10:00:00.000Z',
			minutes: 60,
			place: 'Tern Ward',
			state: 'planned',
			sequence: 1,
			told: ['sms']
		});
		expect(await rowOf(id)).toMatchObject({ localDate: '2026-03-11', localTime: '10:00', sequence: 1 });
		const said = await db().select().from(entries).where(eq(entries.threadId, threadId));
		expect(said.at(-1)?.body).toBe(
			'Visit moved from Mon 9 Mar 10:00 to Wed 11 Mar 10:00, Tern Ward. Reason: The gym is painted.'
		);
		const [row] = await db().select().from(audit).where(eq(audit.action, 'visit.moved'));
		expect(row).toMatchObject({
			objectId: id,
			actorId: hospital.people.coordinator.id,
			detail: { from: '2026-03-09T10:00:00.000Z', to: '2026-03-11T10:00:00.000Z', sequence: 1, told: 'sms' }
		});
		const heard = await db().select().from(liveEvents).where(eq(liveEvents.episodeId, episodeId));
		expect(heard.map(({ topic, kind }) => `${topic} ${kind}`)).toContain('visit moved');
	});

	it('that takes longer at its time and place keeps the yes and the reminders, and sends no text', async () => {
		const { id, threadId, patient } = await booked({ email: 'longer@post.example' });
		await settle(HOSPITAL_NOW, patient);
		await settle(at('2026-03-07T17:00:00Z'), patient);
		await confirmVisit(coordinator(), id);
		const before = await messagesAbout(id, 'reminder');
		const { result } = await rescheduleVisit(coordinator(at('2026-03-07T18:00:00Z')), id, {
			startsAt: MONDAY,
			minutes: 60
		});
		expect(result).toMatchObject({ state: 'confirmed', minutes: 60, sequence: 1, told: ['mail'] });
		expect(await messagesAbout(id, 'reminder')).toEqual(before);
		const said = await db().select().from(entries).where(eq(entries.threadId, threadId));
		expect(said.at(-1)?.body).toBe('Visit on Mon 9 Mar 10:00: it takes 60 minutes now.');
		const { texts, mails } = await settle(at('2026-03-08T17:00:00Z'), patient, 'longer@post.example');
		expect(texts.map(({ body }) => body)).toEqual([expect.stringContaining('your visit is Mon 9 Mar 10:00')]);
		expect(mails.map(({ body }) => body.split('\n')[0])).toEqual([
			'Your visit Mon 9 Mar 10:00, East Gym, now takes 60 minutes.'
		]);
		expect(mails[0]?.calendar).toContain('SEQUENCE:1');
	});

	it('drops the reminders of the old time and plans those of the new one', async () => {
		const { id, episodeId } = await booked();
		await rescheduleVisit(coordinator(), id, { startsAt: WEDNESDAY });
		const reminders = await messagesAbout(id, 'reminder');
		expect(reminders.map(({ state, nextAt }) => [state, nextAt])).toEqual([
			['cancelled', at('2026-03-07T17:00:00Z')],
			['cancelled', at('2026-03-08T17:00:00Z')],
			['ready', at('2026-03-09T17:00:00Z')],
			['ready', at('2026-03-10T17:00:00Z')]
		]);
		expect(reminders.at(-1)?.body).toContain('Wed 11 Mar 10:00');
		const { items } = await visitItemsOf(hospital.people.coordinator, episodeId);
		expect(items[0]?.reminders).toHaveLength(2);
	});

	it('tells the patient by text and by mail, with the file that moves it in their calendar', async () => {
		const { id, patient } = await booked({ email: 'pat@post.example' });
		await settle(HOSPITAL_NOW, patient);
		const { result } = await rescheduleVisit(coordinator(HOSPITAL_NOW + HOUR_MS), id, {
			startsAt: WEDNESDAY
		});
		expect(result.told).toEqual(['sms', 'mail']);
		const { texts, mails } = await settle(HOSPITAL_NOW + HOUR_MS, patient, 'pat@post.example');
		expect(texts.map(({ body }) => body)).toEqual([
			'Saltmarsh General: your visit is MOVED to Wed 11 Mar 10:00, East Gym. Reply YES or NO. Questions: +353 1 555 0100. STOP ends texts.'
		]);
		expect(mails.map(({ to, subject }) => [to, subject])).toEqual([
			['pat@post.example', 'Saltmarsh General: your visit has moved']
		]);
		const [event] = Object.values(ical.sync.parseICS(mails[0]?.calendar ?? '')).filter(
			(one) => one?.type === 'VEVENT'
		);
		expect(event).toMatchObject({ uid: calendarId(id), sequence: 1, start: new Date(WEDNESDAY) });
	});

	it('moved again before it was sent, only the last news goes', async () => {
		const { id, patient } = await booked({ email: 'again@post.example' });
		await rescheduleVisit(coordinator(), id, { startsAt: WEDNESDAY });
		await rescheduleVisit(coordinator(), id, { startsAt: WEDNESDAY + DAY_MS });
		const { texts, mails } = await settle(HOSPITAL_NOW + 1, patient, 'again@post.example');
		const about = texts.filter(({ body }) => body.includes('MOVED'));
		expect(about.map(({ body }) => /MOVED to (\w+ \d+ \w+)/.exec(body)?.[1])).toEqual(['Thu 12 Mar']);
		expect(mails.map(({ calendar }) => /SEQUENCE:(\d+)/.exec(calendar ?? '')?.[1])).toEqual(['2']);
	});

	it('at night the text waits for the morning of the patient', async () => {
		const night = at('2026-03-05T22:30:00Z');
		const { id, patient } = await booked();
		await rescheduleVisit(coordinator(night), id, { startsAt: WEDNESDAY });
		const [news] = await messagesAbout(id, 'visit');
		expect(news?.nextAt).toBe(at('2026-03-06T08:00:00Z'));
		expect((await settle(night, patient)).texts).toEqual([]);
	});

	it.each([
		['no number', { phone: null }],
		['no consent', { smsConsent: false }],
		['opted out', { smsOptedOutAt: HOSPITAL_NOW - 1 }]
	])('%s: nobody is written to, and the answer says so', async (_, change) => {
		const { id } = await booked(change);
		const { result } = await rescheduleVisit(coordinator(), id, { startsAt: WEDNESDAY });
		expect(result.told).toEqual([]);
		expect(await messagesAbout(id, 'visit')).toEqual([]);
	});

	it('a text that could only come after the old time is not sent: somebody has to call', async () => {
		const night = at('2026-03-09T03:00:00Z');
		const { id } = await booked({}, at('2026-03-09T07:30:00Z'));
		const { result } = await rescheduleVisit(coordinator(night), id, { startsAt: WEDNESDAY });
		expect(result.told).toEqual([]);
	});

	it('opted out after the move, the text is not sent', async () => {
		const night = at('2026-03-05T22:30:00Z');
		const { id, patient } = await booked();
		await rescheduleVisit(coordinator(night), id, { startsAt: WEDNESDAY });
		await db().update(patients).set({ smsOptedOutAt: night }).where(eq(patients.id, patient.id));
		expect((await settle(at('2026-03-06T08:00:00Z'), patient)).texts).toEqual([]);
		expect((await messagesAbout(id, 'visit'))[0]).toMatchObject({
			state: 'skipped',
			stateReason: 'opted out'
		});
	});

	it.each([
		['the time it has', { startsAt: MONDAY }, '/startsAt', 'at that time already'],
		['the past', { startsAt: HOSPITAL_NOW - 1 }, '/startsAt', 'must not be in the past'],
		['a place that is none', { startsAt: WEDNESDAY, place: 'Nowhere' }, '/place', "place is 'Nowhere'"]
	])('refuses %s', async (_, input, pointer, words) => {
		const { id } = await booked();
		await expect(rescheduleVisit(coordinator(), id, input)).rejects.toMatchObject({
			code: 'invalid',
			extra: { errors: [{ pointer, message: expect.stringContaining(words) }] }
		});
		expect(await rowOf(id)).toMatchObject({ sequence: 0, startsAt: MONDAY });
	});

	it('is not in its own way, but in that of the patient’s other visit', async () => {
		const { id, episodeId } = await booked();
		const other = { kind: 'single', startsAt: WEDNESDAY, minutes: 45, place: 'East Gym' } as const;
		await bookVisits(coordinator(), episodeId, other);
		await rescheduleVisit(coordinator(), id, { startsAt: MONDAY + 15 * 60_000 });
		await expect(
			rescheduleVisit(coordinator(), id, { startsAt: WEDNESDAY + 44 * 60_000 })
		).rejects.toMatchObject({ code: 'visit-overlaps' });
	});

	it.each([
		['cancelled', HOSPITAL_NOW],
		['planned', MONDAY]
	])('a visit that is %s cannot be moved at %i', async (state, now) => {
		const { id } = await booked();
		if (state === 'cancelled') {
			await cancelVisit(coordinator(), id, 'Away.');
		}
		const answer = await callRoute(postMove, hospital.people.coordinator, {
			params: { id },
			body: { startsAt: new Date(now + 2 * DAY_MS).toISOString() },
			now
		});
		expect([answer.status, answer.body.type, answer.body.state]).toEqual([409, 'wrong-state', state]);
	});

	it.each(ROLES)('as %s', async (role) => {
		const { id } = await booked();
		const body = { startsAt: '2026-03-11T10:00:00Z' };
		const answer = await callRoute(postMove, hospital.people[role], { params: { id }, body });
		expect(answer.status).toBe(['coordinator', 'therapist'].includes(role) ? 200 : 403);
	});

	it('from another unit it is not there', async () => {
		const { id } = await booked();
		const stranger = { ...hospital.people.coordinator, unitIds: ['elsewhere'] };
		const body = { startsAt: '2026-03-11T10:00:00Z' };
		expect((await callRoute(postMove, stranger, { params: { id }, body })).status).toBe(404);
	});
});

describe('a visit that the hospital cancels', () => {
	it('is called off by text and by mail, and in the calendar', async () => {
		const { id, patient } = await booked({ email: 'off@post.example', language: 'es' });
		await cancelVisit(coordinator(), id, 'The gym is closed.');
		const { texts, mails } = await settle(HOSPITAL_NOW + 1, patient, 'off@post.example');
		expect(texts.map(({ body }) => body)).toContain(
			'Saltmarsh General: su cita lun 9 mar 10:00 se ha anulado. No venga, por favor. Preguntas: +353 1 555 0100.'
		);
		const file = mails.find(({ calendar }) => calendar?.includes(calendarId(id)))?.calendar ?? '';
		expect(file).toMatch(/METHOD:CANCEL\r\n[^]*SEQUENCE:1\r\n[^]*STATUS:CANCELLED\r\n/);
		expect(file).not.toContain('closed');
	});
});

describe('a visit that is booked', () => {
	it('goes by mail with its file to who wants mail', async () => {
		const { id, patient } = await booked({ email: 'new@post.example' });
		const { mails } = await settle(HOSPITAL_NOW, patient, 'new@post.example');
		const mail = mails.find(({ to }) => to === 'new@post.example');
		expect(mail?.subject).toBe('Saltmarsh General: your visit');
		expect(mail?.calendar).toMatch(new RegExp(`METHOD:REQUEST\\r\\n[^]*UID:${calendarId(id)}\\r\\nDTSTAMP`));
	});

	it('as a series, all visits are in one file', async () => {
		const { patient, episodeId } = await addPatient({
			unitId: hospital.units.ward,
			email: 'sam@post.example'
		});
		const { result } = await bookVisits(coordinator(), episodeId, {
			kind: 'series',
			from: '2026-03-20',
			weekdays: ['mon', 'wed', 'fri'],
			time: '10:00',
			count: 36,
			minutes: 60,
			place: 'East Gym'
		});
		const { mails } = await settle(HOSPITAL_NOW, patient, 'sam@post.example');
		const mail = mails.find(({ to }) => to === 'sam@post.example');
		const read = Object.values(ical.sync.parseICS(mail?.calendar ?? '')).filter(
			(one) => one?.type === 'VEVENT'
		);
		expect(read.map((one) => (one?.type === 'VEVENT' ? one.uid : ''))).toEqual(
			result.items.map(({ id }) => calendarId(id))
		);
		expect(mail?.body).toContain('36 visits are booked for you.');
	});
});

describe('closed days', () => {
	const day = (date: string) => closeDay(coordinator(), { date, name: 'Saint Patrick’s Day' });

	it('a visit is not booked on one, nor moved to it, and the day is named', async () => {
		const { id, episodeId } = await booked();
		const { result } = await day('2026-03-17');
		const startsAt = at('2026-03-17T10:00:00Z');
		const refused = {
			code: 'invalid',
			extra: {
				errors: [
					{
						pointer: '/startsAt',
						message: '2026-03-17 is a closed day (Saint Patrick’s Day): choose another day.'
					}
				]
			}
		};
		const input = { kind: 'single', startsAt, minutes: 45, place: 'East Gym' } as const;
		await expect(bookVisits(coordinator(), episodeId, input)).rejects.toMatchObject(refused);
		await expect(rescheduleVisit(coordinator(), id, { startsAt })).rejects.toMatchObject(refused);
		await openDay(contextOf(hospital.people.admin), result.id);
		await expect(rescheduleVisit(coordinator(), id, { startsAt })).resolves.toMatchObject({
			replayed: false
		});
	});

	it('a series steps over it and is as long as was asked', async () => {
		await day('2026-04-06');
		const { episodeId } = await addPatient({ unitId: hospital.units.ward });
		const { result } = await bookVisits(coordinator(), episodeId, {
			kind: 'series',
			from: '2026-03-30',
			weekdays: ['mon'],
			time: '10:00',
			count: 3,
			minutes: 60,
			place: 'East Gym'
		});
		// In summer time 10:00 in Dublin is 09:00 UTC.
		expect(result.items.map(({ startsAt }) => startsAt.slice(0, 16))).toEqual([
			'2026-03-30T09:00',
			'2026-04-13T09:00',
			'2026-04-20T09:00'
		]);
	});

	it('says how many visits stand on it, and refuses a day twice or in the past', async () => {
		await booked({}, at('2026-06-02T09:00:00Z'));
		expect((await day('2026-06-02')).result).toMatchObject({ visits: 1 });
		await expect(day('2026-06-02')).rejects.toMatchObject({ code: 'invalid' });
		await expect(day('2026-03-02')).rejects.toMatchObject({ code: 'invalid' });
	});

	it.each(ROLES)('as %s', async (role) => {
		const work = closeDay(contextOf(hospital.people[role]), {
			date: `2026-07-1${ROLES.indexOf(role)}`,
			name: 'Closed'
		});
		await (role === 'coordinator' || role === 'admin'
			? expect(work).resolves.toMatchObject({ replayed: false })
			: expect(work).rejects.toMatchObject({ code: 'not-allowed' }));
	});
});
