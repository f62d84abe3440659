import { eq } from 'drizzle-orm';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { dayAndTime } from '$lib/domain/messages/templates/wording';
import { db } from '$lib/server/db';
import { outbox, type reminders } from '$lib/server/db/schema';
import { addPatient } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { Course, HOME, ZONES, type Truth } from '../support/reminder-course';
import { DEEDS, FATES, stories, type Deed, type Taken } from '../support/reminder-year';

/**
 * The whole way, on a real file, over a year: visits are booked, moved, confirmed, cancelled, marked and taken
 * back at random days and hours, the patient answers, moves house, stops and starts the texts, and the gateway fails
 * as gateways do. Whatever happened, no reminder comes outside 08:00 to 20:00 of the patient, after the start, twice, after STOP, or about a time that does
 * not hold any more.
 */
const hospital = await openHospital({ PORT: '4300' });

const clocks = new Map(
	ZONES.map((zone) => [
		zone,
		new Intl.DateTimeFormat('sv-SE', { timeZone: zone, hour: '2-digit', minute: '2-digit' })
	])
);

const met = new Map(FATES.map((fate) => [fate, 0]));
const done = new Set<Deed['kind']>();

describe.each(ZONES)('property: a patient in %s', (zone) => {
	it('is reminded at daytime, before the start, once, and of what holds', async () => {
		let reminded = 0;
		await fc.assert(
			fc.asyncProperty(stories, async (story) => {
				const { patient, episodeId } = await addPatient({ unitId: hospital.units.ward, zone });
				const course = new Course(hospital, story, patient, episodeId);
				await course.run();
				reminded += await judge(course);
				FATES.forEach((fate) => met.set(fate, (met.get(fate) ?? 0) + course.telephone.met[fate]));
				course.done.forEach((kind) => done.add(kind));
			}),
			{ numRuns: 60 }
		);
		expect(reminded).toBeGreaterThan(0);
	}, 120_000);
});

// Nothing of this would be proved by stories in which nothing happens. Over all zones: a rare deed, such as to take
// back a mark, may be missing from the stories of one.
it('had every deed and every end of an attempt in it', () => {
	expect([...done].sort()).toEqual([...DEEDS].sort());
	expect(Math.min(...met.values())).toBeGreaterThan(0);
});

/** @returns how many reminders there were to judge */
async function judge({ patient, telephone }: Course): Promise<number> {
	const rows = await db().select().from(outbox).where(eq(outbox.patientId, patient.id));
	const kinds = new Map(rows.map(({ id, kind }) => [id, kind]));
	const causes = new Map(rows.map(({ id, causeKey }) => [id, causeKey]));

	for (const { at, message, truth } of telephone.taken) {
		expect(truth.optedOut, `after STOP: ${message.body}`).toBe(false);
		if (kinds.get(message.id) !== 'answer') {
			const clock = clocks.get(truth.zone)?.format(at) ?? '';
			expect(clock >= '08:00' && clock < '20:00', `${clock}: ${message.body}`).toBe(true);
		}
	}
	const told = telephone.taken.filter(({ message }) => kinds.get(message.id) === 'reminder');
	const each = told.map(({ message }) => message.id);
	expect(new Set(each).size, 'the same reminder twice').toBe(each.length);

	const times = new Map<string, number>();
	for (const taken of told) {
		const reminder = taken.truth.reminders.find(({ messageId }) => messageId === taken.message.id);
		holds(taken, reminder);
		const kind = causes.get(taken.message.id)?.split(':').at(-1);
		const time = `${reminder?.visitId} ${reminder?.sequence} ${kind}`;
		times.set(time, (times.get(time) ?? 0) + 1);
	}
	expect(Math.max(0, ...times.values()), 'twice of one time').toBeLessThanOrEqual(1);
	return told.length;
}

/** What a reminder tells is so at that moment: of a visit that is expected, at that very time, and has not begun. */
function holds(
	{ at, message, truth }: Taken<Truth>,
	reminder: typeof reminders.$inferSelect | undefined
): void {
	const visit = truth.visits.find(({ id }) => id === reminder?.visitId);
	expect(visit?.sequence, message.body).toBe(reminder?.sequence);
	expect(['planned', 'confirmed'], message.body).toContain(visit?.state);
	expect(visit?.startsAt, message.body).toBeGreaterThan(at);
	expect(message.body).toContain(dayAndTime(visit?.startsAt ?? 0, HOME, 'en'));
}
