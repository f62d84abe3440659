import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { VISIT_STATES } from '../core/codes';
import { HOUR, MINUTE, addDays, daysBetween, instantOf, localDateOf } from '../core/time';
import { judgeReminder, planReminders } from './reminders';
import type { ReminderFacts } from './reminders';

const utc = (text: string) => Date.parse(text);
const DUBLIN = 'Europe/Dublin';
const ZONES = ['Europe/Berlin', 'America/New_York', 'Australia/Lord_Howe', DUBLIN];
const LONG_AGO = utc('2020-01-01');

function plan(startsAt: string, options: { inSeries?: boolean; patientZone?: string; now?: string } = {}) {
	const { inSeries = false, patientZone = DUBLIN, now } = options;
	const context = { zone: DUBLIN, patientZone, now: now ? utc(now) : LONG_AGO };
	return planReminders({ startsAt: utc(startsAt), inSeries }, context);
}

const due = (...args: Parameters<typeof plan>) =>
	plan(...args).map(({ kind, dueAt }) => `${kind} ${new Date(dueAt).toISOString().slice(0, 16)}`);

describe('planReminders', () => {
	it.each([
		[
			'a single visit',
			'2025-01-16T10:00Z',
			['two-days-before 2025-01-14T17:00', 'day-before 2025-01-15T17:00']
		],
		['in summer', '2025-07-16T09:00Z', ['two-days-before 2025-07-14T16:00', 'day-before 2025-07-15T16:00']],
		// The clock goes forward on Sunday 30 March: both are at 17:00 on the wall.
		[
			'over a change',
			'2025-03-31T09:00Z',
			['two-days-before 2025-03-29T17:00', 'day-before 2025-03-30T16:00']
		]
	])('%s', (_, startsAt, expected) => {
		expect(due(startsAt)).toEqual(expected);
		expect(due(startsAt, { inSeries: true })).toEqual(expected.slice(1));
	});

	it.each([
		// 17:00 in Dublin is 12:00 in New York, 04:00 the next day on Lord Howe, 22:30 in Kolkata.
		['America/New_York', 'day-before 2025-01-15T17:00'],
		// 04:00 there: 08:00 is 4 h away, 19:59 of the evening before 8 h.
		['Australia/Lord_Howe', 'day-before 2025-01-15T21:00'],
		// 22:30 there: 19:59 is 2 h 31 away.
		['Asia/Kolkata', 'day-before 2025-01-15T14:29']
	])('a patient in %s is reminded in the hours of that zone', (patientZone, expected) => {
		expect(due('2025-01-16T10:00Z', { patientZone, inSeries: true })).toEqual([expected]);
	});

	it.each([
		['at the very minute', '2025-01-14T17:00Z', 2],
		['a minute after the first', '2025-01-14T17:01Z', 1],
		['a minute after the last', '2025-01-15T17:01Z', 0],
		['after the start', '2025-01-16T10:01Z', 0]
	])('booked late, %s: nothing in the past', (_, now, count) => {
		expect(due('2025-01-16T10:00Z', { now })).toHaveLength(count);
	});

	it('turns to the other side of the night when the nearest time is past', () => {
		// Wanted 22:30 in Kolkata, booked there at 21:30: 19:59 is over, 08:00 is 07:30 before the visit.
		const options = { patientZone: 'Asia/Kolkata', now: '2025-01-15T16:00Z', inSeries: true };
		expect(due('2025-01-16T10:00Z', options)).toEqual(['day-before 2025-01-16T02:30']);
	});

	it('leaves out a reminder whose only time left would be after the start', () => {
		// Booked at 21:30 in Kolkata for 06:00 there: between the two lies only the night.
		const options = { patientZone: 'Asia/Kolkata', now: '2025-01-15T16:00Z', inSeries: true };
		expect(due('2025-01-16T00:30Z', options)).toEqual([]);
		expect(due('2025-01-16T02:30Z', options)).toEqual([]);
		expect(due('2025-01-16T02:31Z', options)).toEqual(['day-before 2025-01-16T02:30']);
	});

	it('a reminder expires when the next is due, the last when the visit begins', () => {
		const [first, second] = plan('2025-01-16T10:00Z');
		expect(first?.expiresAt).toBe(second?.dueAt);
		expect(second?.expiresAt).toBe(utc('2025-01-16T10:00Z'));
	});
});

/** A second opinion that shares no code with the date library. */
const hours = new Map(
	ZONES.map((zone) => [
		zone,
		new Intl.DateTimeFormat('sv-SE', { timeZone: zone, hour: '2-digit', minute: '2-digit' })
	])
);

describe('property: over a year, hospital and patient in any of four zones', () => {
	const zone = fc.constantFrom(...ZONES);
	const startsAt = fc
		.integer({ min: utc('2025-01-01') / MINUTE, max: utc('2026-01-01') / MINUTE })
		.map((minutes) => minutes * MINUTE);
	const leadMinutes = fc.oneof(fc.constant(60 * 24 * 30), fc.integer({ min: -600, max: 60 * 72 }));

	it('never outside the hours, in the past, after the start, or twice', () => {
		fc.assert(
			fc.property(startsAt, zone, zone, fc.boolean(), leadMinutes, (start, home, away, inSeries, lead) => {
				const now = start - lead * MINUTE;
				const reminders = planReminders(
					{ startsAt: start, inSeries },
					{ zone: home, patientZone: away, now }
				);
				for (const { dueAt, expiresAt } of reminders) {
					const wall = hours.get(away)?.format(dueAt) ?? '';
					expect(wall >= '08:00' && wall < '20:00', wall).toBe(true);
					expect(dueAt).toBeGreaterThanOrEqual(now);
					expect(dueAt).toBeLessThan(expiresAt);
					expect(expiresAt).toBeLessThanOrEqual(start);
				}
				const kinds = reminders.map(({ kind }) => kind);
				const times = reminders.map(({ dueAt }) => dueAt);
				expect(new Set(kinds).size).toBe(kinds.length);
				expect(new Set(times).size).toBe(times.length);
				expect(times).toEqual([...times].sort((a, b) => a - b));
			}),
			{ numRuns: 3000 }
		);
		// Thousands of dates in four zones: slow where a machine is busy.
	}, 60_000);

	it('none is dropped for a visit at daytime that is booked in time', () => {
		fc.assert(
			fc.property(startsAt, zone, zone, fc.boolean(), (at, home, away, inSeries) => {
				const date = localDateOf(at, home);
				const start = instantOf(date, '10:00', home);
				const context = { zone: home, patientZone: away, now: start - 30 * 24 * HOUR };
				const reminders = planReminders({ startsAt: start, inSeries }, context);
				expect(reminders).toHaveLength(inSeries ? 1 : 2);
				for (const { kind, dueAt } of reminders) {
					const wanted = addDays(date, kind === 'day-before' ? -1 : -2);
					expect(Math.abs(daysBetween(wanted, localDateOf(dueAt, home)))).toBeLessThanOrEqual(1);
					expect(Math.abs(dueAt - instantOf(wanted, '17:00', home))).toBeLessThanOrEqual(6 * HOUR + MINUTE);
				}
			}),
			{ numRuns: 1000 }
		);
	});
});

describe('judgeReminder, at the moment of sending', () => {
	const facts: ReminderFacts = {
		state: 'planned',
		startsAt: utc('2025-01-16T10:00Z'),
		upToDate: true,
		expiresAt: utc('2025-01-16T10:00Z'),
		hasPhone: true,
		consented: true,
		optedOut: false,
		patientZone: DUBLIN
	};
	const NOW = utc('2025-01-15T17:00Z');

	it('sends what is due, wanted and allowed', () => {
		expect(judgeReminder(facts, NOW)).toEqual({ kind: 'send' });
		expect(judgeReminder({ ...facts, state: 'confirmed' }, NOW)).toEqual({ kind: 'send' });
	});

	it.each(VISIT_STATES.filter((state) => state !== 'planned' && state !== 'confirmed'))(
		'skips a visit that is %s',
		(state) => {
			expect(judgeReminder({ ...facts, state }, NOW)).toEqual({
				kind: 'skip',
				reason: 'visit is over or cancelled'
			});
		}
	);

	it.each([
		['visit has moved', { upToDate: false }],
		['no telephone number', { hasPhone: false }],
		['opted out', { optedOut: true }],
		['no consent', { consented: false }],
		['too late', { expiresAt: NOW }],
		['too late', { startsAt: NOW }]
	] as const)('skips: %s', (reason, change) => {
		expect(judgeReminder({ ...facts, ...change }, NOW)).toEqual({ kind: 'skip', reason });
	});

	it('is still in time a millisecond before it expires', () => {
		expect(judgeReminder({ ...facts, expiresAt: NOW + 1 }, NOW)).toEqual({ kind: 'send' });
	});

	it.each([
		['19:59', { kind: 'send' }],
		['20:00', { kind: 'wait', until: utc('2025-01-16T08:00Z') }],
		['23:30', { kind: 'wait', until: utc('2025-01-16T08:00Z') }]
	])('late at %s: %o', (time, expected) => {
		expect(judgeReminder(facts, utc(`2025-01-15T${time}Z`))).toEqual(expected);
	});

	it('does not wait for a morning that comes too late', () => {
		const early = { ...facts, startsAt: utc('2025-01-16T08:00Z') };
		expect(judgeReminder(early, utc('2025-01-15T20:00Z'))).toEqual({ kind: 'skip', reason: 'too late' });
	});
});
