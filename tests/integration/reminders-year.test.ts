import { and, asc, eq } from 'drizzle-orm';
import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { WEEKDAYS, addDays, instantOf, localDateOf } from '$lib/domain/core/time';
import type { BookVisits } from '$lib/domain/visits/forms';
import { Problem } from '$lib/domain/core/errors';
import { db } from '$lib/server/db';
import { outbox, patients, visits } from '$lib/server/db/schema';
import type { Outgoing } from '$lib/server/outbox/channels/channel';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { bookVisits, cancelVisit, confirmVisit } from '$lib/server/visits/actions';
import { rescheduleVisit } from '$lib/server/visits/reschedule';
import { dayAndTime } from '$lib/domain/messages/templates/wording';
import { freshDatabase } from '../support/database';
import { testEnvironment } from '../support/environment';
import { addPatient, contextOf, makeHospital, type Hospital } from '../support/hospital';
import { DAY_MS, HOUR_MS } from '../support/lengths';

/**
 * The whole way, on a real file, over a year: visits are booked, moved, confirmed and cancelled at random days and
 * hours, and the worker sends what is due. Whatever happened, no reminder comes outside 08:00 to 20:00 of the
 * patient, after the start, twice, or about a time that does not hold any more.
 */
const ZONES = ['Europe/Berlin', 'America/New_York', 'Australia/Lord_Howe', 'Europe/Dublin'];
const YEAR = Date.parse('2026-01-01T00:00:00Z');

let hospital: Hospital;
let cleanUp: () => void;

beforeAll(async () => {
	const environment = testEnvironment();
	const database = await freshDatabase();
	hospital = await makeHospital(YEAR - DAY_MS);
	cleanUp = () => {
		database.close();
		environment.remove();
	};
});
afterAll(() => cleanUp());

type Deed = { kind: 'move' | 'confirm' | 'cancel' | 'stop'; hoursLater: number; days: number; time: string };

const times = fc.constantFrom(
	'00:30',
	'01:30',
	'02:30',
	'07:30',
	'09:00',
	'10:00',
	'14:15',
	'18:45',
	'23:30'
);
const deeds = fc.array(
	fc.record({
		kind: fc.constantFrom<Deed['kind']>('move', 'move', 'move', 'confirm', 'cancel', 'stop'),
		hoursLater: fc.integer({ min: 0, max: 60 }),
		days: fc.integer({ min: -2, max: 6 }),
		time: times
	}),
	{ maxLength: 4 }
);
const stories = fc.record({
	day: fc.integer({ min: 0, max: 364 }),
	lead: fc.integer({ min: 0, max: 120 }),
	time: times,
	series: fc.boolean(),
	lateMinutes: fc.constantFrom(0, 0, 1, 30, 300),
	deeds
});

type Sent = { at: number; message: Outgoing };

/** Everything that went out by text, with the moment. */
class Log {
	readonly texts: Sent[] = [];
	now = YEAR;
	readonly lookUp = null;

	send(message: Outgoing) {
		this.texts.push({ at: this.now, message });
		return Promise.resolve({ outcome: { kind: 'accepted' as const, id: message.id }, code: null });
	}
}

const wall = new Map(
	ZONES.map((zone) => [
		zone,
		new Intl.DateTimeFormat('sv-SE', { timeZone: zone, hour: '2-digit', minute: '2-digit' })
	])
);

async function unlessRefused(work: Promise<unknown>): Promise<void> {
	try {
		await work;
	} catch (thrown) {
		if (!(thrown instanceof Problem)) {
			throw thrown;
		}
	}
}

describe.each(ZONES)('property: a patient in %s', (zone) => {
	it('is reminded at daytime, before the start, once, and of what holds', async () => {
		await fc.assert(
			fc.asyncProperty(stories, async (story) => {
				const { patient, episodeId } = await addPatient({ unitId: hospital.units.ward, zone, now: YEAR });
				const date = addDays('2026-01-03', story.day);
				const startsAt = instantOf(date, story.time, 'Europe/Dublin');
				let now = startsAt - story.lead * HOUR_MS;
				const context = () => contextOf(hospital.people.coordinator, now);
				const log = new Log();
				const worker = new OutboxWorker({ channels: { sms: log, mail: null }, now: () => log.now });
				/** Let time pass from one due message to the next; the worker comes a little late, as machines do. */
				const truth: { at: number; startsAt: number; open: boolean }[] = [];
				const pass = async (until: number) => {
					for (;;) {
						const [next] = await db()
							.select({ at: outbox.nextAt })
							.from(outbox)
							.where(and(eq(outbox.patientId, patient.id), eq(outbox.state, 'ready')))
							.orderBy(asc(outbox.nextAt))
							.limit(1);
						if (!next || next.at > until) {
							break;
						}
						log.now = Math.max(now, next.at) + story.lateMinutes * 60_000;
						for (const row of await db().select().from(visits).where(eq(visits.episodeId, episodeId))) {
							const open = row.state === 'planned' || row.state === 'confirmed';
							truth.push({ at: log.now, startsAt: row.startsAt, open });
						}
						await worker.settle();
					}
					now = until;
				};
				const { time } = story;
				const where = { minutes: 45, place: 'East Gym' };
				const input: BookVisits = story.series
					? { kind: 'series', from: date, weekdays: [...WEEKDAYS], time, count: 2, ...where }
					: { kind: 'single', startsAt, ...where };
				await unlessRefused(bookVisits(context(), episodeId, input));
				const [visit] = await db().select().from(visits).where(eq(visits.episodeId, episodeId));
				for (const deed of visit ? story.deeds : []) {
					await pass(now + deed.hoursLater * HOUR_MS);
					const [row] = await db()
						.select()
						.from(visits)
						.where(eq(visits.id, visit?.id ?? ''));
					const to = addDays(localDateOf(row?.startsAt ?? 0, 'Europe/Dublin'), deed.days);
					await unlessRefused(
						{
							move: () =>
								rescheduleVisit(context(), row?.id ?? '', {
									startsAt: instantOf(to, deed.time, 'Europe/Dublin')
								}),
							confirm: () => confirmVisit(context(), row?.id ?? ''),
							cancel: () => cancelVisit(context(), row?.id ?? '', 'Away.'),
							stop: () =>
								db().update(patients).set({ smsOptedOutAt: now }).where(eq(patients.id, patient.id)).then()
						}[deed.kind]()
					);
				}
				await pass(now + 4 * DAY_MS);
				judge(
					log.texts.filter(({ message }) => message.to === patient.phone),
					truth,
					zone
				);
			}),
			{ numRuns: 60 }
		);
	}, 120_000);
});

function judge(texts: Sent[], truth: { at: number; startsAt: number; open: boolean }[], zone: string): void {
	const reminders = texts.filter(({ message }) => / your visit is (?!MOVED)/.test(message.body));
	const told = reminders.map(({ at, message }) => `${at} ${message.body}`);
	expect(new Set(told).size).toBe(told.length);
	for (const { at, message } of texts) {
		const clock = wall.get(zone)?.format(at) ?? '';
		expect(clock >= '08:00' && clock < '20:00', `${clock}: ${message.body}`).toBe(true);
	}
	for (const { at, message } of reminders) {
		// Of a visit that is at that moment expected, at that very time, and has not begun.
		const holding = truth.filter(
			(fact) =>
				fact.at === at &&
				fact.open &&
				fact.startsAt > at &&
				message.body.includes(dayAndTime(fact.startsAt, 'Europe/Dublin', 'en'))
		);
		expect(holding.length, message.body).toBeGreaterThan(0);
	}
	// Two of the same time may go, two days and one day before; never more.
	const times = reminders.map(({ message }) => /visit is (.+?), East Gym/.exec(message.body)?.[1] ?? '');
	for (const time of new Set(times)) {
		expect(times.filter((other) => other === time).length).toBeLessThanOrEqual(2);
	}
}
