import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { CLOSE_REASONS } from '$lib/domain/core/codes';
import type { BookVisits } from '$lib/domain/visits/forms';
import { db } from '$lib/server/db';
import { outbox, patientLinks, visits } from '$lib/server/db/schema';
import { closeEpisode } from '$lib/server/episodes/close';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { sendPage } from '$lib/server/patient-page/share';
import { bookVisits } from '$lib/server/visits/actions';
import { ScriptedChannel } from '../support/channels';
import { addPatient, contextOf, HOSPITAL_NOW } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

/** What the end of a stay does to the visits ahead, and to what was to be sent about them. */

const hospital = await openHospital({ PUBLIC_URL: 'https://ropewalk.saltmarsh.example' });
const HOUR = 60 * 60 * 1000;
const DAY = 24 * HOUR;

const coordinator = () => contextOf(hospital.people.coordinator);
let episodeId: string;
let patientId: string;
let visitId: string;

let days = 5;

beforeEach(async () => {
	await db().update(outbox).set({ state: 'cancelled' });
	const made = await addPatient({ unitId: hospital.units.gym });
	[episodeId, patientId] = [made.episodeId, made.patient.id];
	days += 1;
	const visit = {
		kind: 'single',
		startsAt: HOSPITAL_NOW + days * DAY,
		minutes: 45,
		place: 'East Gym'
	} as const;
	visitId = (await bookVisits(coordinator(), episodeId, visit)).result.items[0]?.id ?? '';
	await sendPage(coordinator(), episodeId, 'sms');
});

/** What still reaches the patient from now until the visit is over, an hour at a time. */
async function sentUntilTheVisit(): Promise<string[]> {
	const sms = new ScriptedChannel();
	for (let now = HOSPITAL_NOW; now <= HOSPITAL_NOW + days * DAY; now += HOUR) {
		await new OutboxWorker({ channels: { sms, mail: new ScriptedChannel() }, now: () => now }).settle();
	}
	return sms.sent.map(({ body }) => body);
}
const visit = async () => (await db().select().from(visits).where(eq(visits.id, visitId)))[0];
const links = () => db().select().from(patientLinks).where(eq(patientLinks.episodeId, episodeId));

describe('a stay that is over', () => {
	it.each(CLOSE_REASONS.filter((reason) => reason !== 'home'))(
		'for %s ends visits, page and reminders',
		async (reason) => {
			await closeEpisode(contextOf(hospital.people.physician), episodeId, reason);
			expect(await visit()).toMatchObject({ state: 'cancelled', patientCancelledAt: null });
			expect((await links()).every(({ revokedAt }) => revokedAt === HOSPITAL_NOW)).toBe(true);
			const sent = await sentUntilTheVisit();
			expect(sent.filter((body) => body.includes('YES'))).toEqual([]);
			expect(sent.length).toBe(reason === 'died' || reason === 'entered-in-error' ? 0 : 1);
		}
	);

	it('for home leaves them: somebody comes back to their visits', async () => {
		await closeEpisode(contextOf(hospital.people.physician), episodeId, 'home');
		expect((await visit())?.state).toBe('planned');
		expect((await links()).every(({ revokedAt }) => revokedAt === null)).toBe(true);
		expect((await sentUntilTheVisit()).filter((body) => body.includes('YES'))).not.toEqual([]);
	});

	it('with a death sends nothing at all, not even what waited from another stay', async () => {
		const [row] = await db().select().from(outbox).where(eq(outbox.patientId, patientId));
		expect(row).toBeDefined();
		await closeEpisode(contextOf(hospital.people.physician), episodeId, 'died');
		await db().update(outbox).set({ state: 'ready' }).where(eq(outbox.patientId, patientId));
		expect(await sentUntilTheVisit()).toEqual([]);
	});

	it('tells of all visits ahead at once, by one text and one mail whose file takes each out', async () => {
		const made = await addPatient({ unitId: hospital.units.gym, email: 'all@post.example' });
		const input: BookVisits = {
			kind: 'series',
			from: '2026-03-30',
			weekdays: ['mon', 'wed'],
			time: '07:15',
			count: 3,
			minutes: 45,
			place: 'Tern Ward'
		};
		await bookVisits(coordinator(), made.episodeId, input);
		await db().update(outbox).set({ state: 'cancelled' });
		await closeEpisode(contextOf(hospital.people.physician), made.episodeId, 'other-hospital');
		const [sms, mail] = [new ScriptedChannel(), new ScriptedChannel()];
		await new OutboxWorker({ channels: { sms, mail }, now: () => HOSPITAL_NOW }).settle();
		expect(sms.sent.map(({ body }) => body)).toEqual([
			expect.stringContaining('all your visits from Mon 30 Mar 07:15 on are cancelled')
		]);
		expect(mail.sent).toHaveLength(1);
		const [{ body, calendar } = { body: '', calendar: '' }] = mail.sent;
		expect(body).toContain(
			'Mon 30 Mar 07:15, Tern Ward\nWed 1 Apr 07:15, Tern Ward\nMon 6 Apr 07:15, Tern Ward'
		);
		expect(calendar?.match(/METHOD:\w+|STATUS:\w+|SEQUENCE:\d+/g)).toEqual([
			'METHOD:PUBLISH',
			...Array.from({ length: 3 }, () => ['SEQUENCE:1', 'STATUS:CANCELLED']).flat()
		]);
	});

	it.each([
		['home', true],
		['other-hospital', false]
	] as const)('for %s takes a new link and a new visit: %s', async (reason, taken) => {
		await closeEpisode(contextOf(hospital.people.physician), episodeId, reason);
		const another = {
			kind: 'single',
			startsAt: HOSPITAL_NOW + 40 * DAY,
			minutes: 45,
			place: 'East Gym'
		} as const;
		const tried = await Promise.allSettled([
			sendPage(coordinator(), episodeId, 'sms'),
			bookVisits(coordinator(), episodeId, another)
		]);
		expect(tried.map(({ status }) => status === 'fulfilled')).toEqual([taken, taken]);
	});
});
