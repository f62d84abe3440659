import { expect, it } from 'vitest';
import { calendarId } from '$lib/domain/visits/calendar';
import { PARSERS } from '$lib/domain/visits/testing/read-calendar';
import { env } from '$lib/server/env';
import { openChannels } from '$lib/server/outbox/channels';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { bookVisits, cancelVisit } from '$lib/server/visits/actions';
import { rescheduleVisit } from '$lib/server/visits/reschedule';
import { itemsOf } from '../support/fakes';
import { HOSPITAL_NOW, addPatient, contextOf } from '../support/hospital';
import { openGateway } from '../support/open-gateway';

/** Calendar files as they come out of a mail that went over SMTP, read by two parsers that are not ours. */

const MONDAY = Date.parse('2026-03-09T10:00:00Z');
const HOUR = 3_600_000;

const { gateway, hospital } = await openGateway();

interface Mail {
	to: string;
	html: string;
	attachments: { filename: string | null; contentType: string; method: string | null; content: string }[];
}

/** Sends what waits, and answers the newest mail to that address with its calendar files as they arrived. */
async function newestTo(email: string) {
	const now = HOSPITAL_NOW;
	await new OutboxWorker({ channels: { ...openChannels(env()), sms: null }, now: () => now }).settle();
	const mails = await itemsOf<Mail>(`${gateway.mailUrl}/mails`);
	const mail = mails.filter(({ to }) => to.includes(email)).at(-1);
	const files = mail?.attachments ?? [];
	return {
		html: mail?.html ?? '',
		/** One is the part that a calendar answers to, the other the file that a person opens. */
		parts: files.map(({ filename, contentType, method }) => [filename, contentType, method]),
		texts: files.map(({ content }) => Buffer.from(content, 'base64').toString('utf8'))
	};
}

const coordinator = () => contextOf(hospital.people.coordinator);

function expectRead(texts: string[], method: string, events: object[]): void {
	expect(texts).toHaveLength(2);
	for (const text of texts) {
		for (const [, read] of PARSERS) {
			expect(read(text)).toMatchObject({ method, events });
		}
	}
}

it('a visit that is booked, moved and cancelled: one entry, by one identifier', async () => {
	const email = 'one@post.example';
	const { episodeId } = await addPatient({ unitId: hospital.units.ward, email, language: 'es' });
	const input = { kind: 'single', startsAt: MONDAY, minutes: 45, place: 'East Gym' } as const;
	const { result } = await bookVisits(coordinator(), episodeId, input);
	const id = result.items[0]?.id ?? '';
	const uid = calendarId(id);

	const booked = await newestTo(email);
	expect(booked.parts).toEqual([
		[null, 'text/calendar', 'REQUEST'],
		['visit.ics', 'application/ics', null]
	]);
	expect(booked.html).toContain('<html lang="es">');
	expectRead(booked.texts, 'REQUEST', [
		{
			uid,
			sequence: 0,
			start: MONDAY,
			end: MONDAY + 45 * 60_000,
			summary: 'Cita, Saltmarsh General',
			location: 'East Gym',
			status: 'CONFIRMED'
		}
	]);

	await rescheduleVisit(coordinator(), id, { startsAt: MONDAY + HOUR });
	expectRead((await newestTo(email)).texts, 'REQUEST', [{ uid, sequence: 1, start: MONDAY + HOUR }]);

	await cancelVisit(coordinator(), id, 'Closed.');
	const cancelled = await newestTo(email);
	expect(cancelled.parts[0]).toEqual([null, 'text/calendar', 'CANCEL']);
	expectRead(cancelled.texts, 'CANCEL', [{ uid, sequence: 2, status: 'CANCELLED' }]);
});

it('a series: all visits in one file', async () => {
	const email = 'series@post.example';
	const { episodeId } = await addPatient({ unitId: hospital.units.ward, email });
	const series = { from: '2026-03-23', time: '10:00', count: 36, minutes: 60, place: 'Tern Ward' };
	const { result } = await bookVisits(coordinator(), episodeId, {
		kind: 'series',
		weekdays: ['mon', 'wed', 'fri'],
		...series
	});
	const { parts, texts } = await newestTo(email);
	expect(parts[0]).toEqual([null, 'text/calendar', 'PUBLISH']);
	expectRead(
		texts,
		'PUBLISH',
		result.items.map(({ id, startsAt }) => ({
			uid: calendarId(id),
			start: Date.parse(startsAt),
			sequence: 0
		}))
	);
});
