import { describe, expect, it } from 'vitest';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { sendPage, sharingOf } from '$lib/server/patient-page/share';
import { attendVisit, bookVisits, cancelVisit, missVisit, reopenVisit } from '$lib/server/visits/actions';
import { visitItemsOf } from '$lib/server/visits/queries';
import { ScriptedChannel, permanent } from '../support/channels';
import { HOSPITAL_NOW, addPatient, contextOf } from '../support/hospital';
import { remindersOf } from '../support/messages';
import { openHospital } from '../support/open-hospital';

/** What became of the messages about a visit, as whoever plans visits sees it. */

const hospital = await openHospital({ PORT: '4300' });
const MONDAY = Date.parse('2026-03-09T10:00:00Z');
const FIRST = Date.parse('2026-03-07T17:00:00Z');
const SECOND = Date.parse('2026-03-08T17:00:00Z');
const staff = (now = HOSPITAL_NOW) => contextOf(hospital.people.coordinator, now);

async function booked() {
	const made = await addPatient({ unitId: hospital.units.ward });
	const input = { kind: 'single', startsAt: MONDAY, minutes: 45, place: 'East Gym' } as const;
	const { result } = await bookVisits(staff(), made.episodeId, input);
	return { ...made, id: result.items[0]?.id ?? '' };
}

async function settle(now: number, sms = new ScriptedChannel()) {
	await new OutboxWorker({ channels: { sms, mail: null }, now: () => now }).settle();
	return sms.sent;
}

const fates = async (episodeId: string) =>
	(await visitItemsOf(hospital.people.coordinator, episodeId)).items[0]?.reminders.map(({ state }) => state);

describe('a visit that is cancelled', () => {
	it('keeps what became of its reminders', async () => {
		const { id, episodeId } = await booked();
		await settle(FIRST);
		expect(await fates(episodeId)).toEqual(['accepted', 'ready']);
		await cancelVisit(staff(FIRST + 1), id, 'The gym floods.');
		expect(await fates(episodeId)).toEqual(['accepted', 'cancelled']);
	});
});

describe('a visit that was marked as over by mistake, and taken back', () => {
	it.each([
		['attended', attendVisit],
		['missed', missVisit]
	] as const)('%s: what was still to come is planned again, what was sent is not', async (_, mark) => {
		const { id, patient } = await booked();
		await settle(FIRST);
		await mark(staff(FIRST + 1), id, null);
		expect((await remindersOf(id)).map(({ state }) => state)).toEqual(['accepted', 'cancelled']);
		await reopenVisit(staff(FIRST + 2), id, 'A slip.');
		expect((await remindersOf(id)).map(({ state }) => state)).toEqual(['accepted', 'ready']);
		const sent = await settle(SECOND);
		expect(sent.filter(({ to }) => to === patient.phone).map(({ body }) => body)).toEqual([
			expect.stringContaining('Reply YES or NO')
		]);
	});

	it('after the hour of the last one has none', async () => {
		const { id } = await booked();
		await attendVisit(staff(), id, null);
		await reopenVisit(staff(SECOND + 1), id, 'A slip.');
		expect((await remindersOf(id)).map(({ state }) => state)).toEqual(['cancelled', 'cancelled']);
	});
});

describe('the link of the page', () => {
	it('shows what became of its message', async () => {
		const { episodeId } = await addPatient({ unitId: hospital.units.ward });
		const messageOf = async () => (await sharingOf(staff(), episodeId)).link?.message;
		await sendPage(staff(), episodeId, 'sms');
		expect(await messageOf()).toBe('ready');
		await settle(HOSPITAL_NOW);
		expect(await messageOf()).toBe('accepted');
		await sendPage(staff(), episodeId, 'sms');
		const refusing = new ScriptedChannel();
		refusing.script = [permanent('refused')];
		await settle(HOSPITAL_NOW, refusing);
		expect(await messageOf()).toBe('failed');
	});
});
