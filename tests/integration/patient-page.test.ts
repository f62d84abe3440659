import { and, eq } from 'drizzle-orm';
import ICAL from 'ical.js';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ROLES } from '$lib/domain/core/codes';
import type { PageDeed } from '$lib/domain/patient-page/forms';
import type { Context } from '$lib/server/context';
import { db } from '$lib/server/db';
import { audit, entries, idempotencyKeys, outbox, patientLinks, visits } from '$lib/server/db/schema';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { OutboxWorker } from '$lib/server/outbox/worker';
import {
	answerOnPage,
	calendarOfPage,
	languageOfPage,
	pageExists,
	readPage
} from '$lib/server/patient-page/link';
import { endPage, openLinkOf, PAGE_LIFE_MS, sendPage } from '$lib/server/patient-page/share';
import { bookVisits } from '$lib/server/visits/actions';
import { rescheduleVisit } from '$lib/server/visits/reschedule';
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
import { DAY_MS } from '../support/lengths';

const MONDAY = Date.parse('2026-03-09T10:00:00Z');

let hospital: Hospital;
let cleanUp: () => void;

beforeAll(async () => {
	const environment = testEnvironment({ PUBLIC_URL: 'https://ropewalk.saltmarsh.example' });
	const database = await freshDatabase();
	hospital = await makeHospital();
	cleanUp = () => {
		database.close();
		environment.remove();
	};
});
afterAll(() => cleanUp());

const coordinator = (now = HOSPITAL_NOW) => contextOf(hospital.people.coordinator, now);
/** Somebody who holds the link and is nobody else. */
const holder = (now = HOSPITAL_NOW, key: Context['key'] = null): Context => ({
	actor: null,
	now,
	address: '127.0.0.1',
	key
});

async function withVisit(change: Partial<Parameters<typeof addPatient>[0]> = {}) {
	const made = await addPatient({ unitId: hospital.units.ward, ...change });
	const { threadId } = await addReferral({ episodeId: made.episodeId, askedBy: hospital.people.surgeon.id });
	const input = { kind: 'single', startsAt: MONDAY, minutes: 45, place: 'East Gym' } as const;
	const { result } = await bookVisits(coordinator(), made.episodeId, input);
	return { ...made, threadId, visitId: result.items[0]?.id ?? '' };
}

/** Sends the link, and reads it out of the message as the patient gets it. */
async function withPage(change: Parameters<typeof withVisit>[0] = {}, way: 'sms' | 'mail' = 'sms') {
	const made = await withVisit(change);
	const { result } = await sendPage(coordinator(), made.episodeId, way);
	const body = await bodySent(HOSPITAL_NOW + 1, /\/p\//, way);
	const token = /https:\/\/ropewalk\.saltmarsh\.example\/p\/([\w-]{22})(?=\s)/.exec(body)?.[1] ?? '';
	return { ...made, token, linkId: result.id, body };
}

async function bodySent(now: number, wanted: RegExp, way: 'sms' | 'mail') {
	const channels = { sms: new ScriptedChannel(), mail: new ScriptedChannel() };
	await new OutboxWorker({ channels, now: () => now }).settle();
	return channels[way].sent.filter(({ body }) => wanted.test(body)).at(-1)?.body ?? '';
}

const deed = (visit: string, what: PageDeed['deed'], why = '', sequence = 0): PageDeed => ({
	deed: what,
	visit,
	sequence,
	why,
	key: ''
});
const stateOf = async (id: string) => (await db().select().from(visits).where(eq(visits.id, id)))[0]?.state;

describe('the link', () => {
	it('goes by text in one part; only its digest is stored', async () => {
		const { token, body, linkId } = await withPage();
		expect(body).toBe(
			`Saltmarsh General: your visits: https://ropewalk.saltmarsh.example/p/${token} For you alone. Help: +353 1 555 0100. STOP ends texts.`
		);
		const [stored] = await db().select().from(patientLinks).where(eq(patientLinks.id, linkId));
		const [message] = await db().select().from(outbox).where(eq(outbox.linkId, linkId));
		expect(JSON.stringify([stored, message])).not.toContain(token);
		expect(stored?.expiresAt).toBe(HOSPITAL_NOW + PAGE_LIFE_MS);
	});

	it('goes by mail to who wants mail', async () => {
		const { token, episodeId } = await withPage({ email: 'pat@post.example' }, 'mail');
		expect((await readPage(holder(), token)).visits).toHaveLength(1);
		expect(await openLinkOf(db(), episodeId, HOSPITAL_NOW)).toMatchObject({
			way: 'mail',
			message: 'accepted'
		});
	});

	it.each([
		['sms', { phone: null }, 'no telephone number'],
		['sms', { smsConsent: false }, 'has not consented to it'],
		['sms', { smsOptedOutAt: 1 }, 'no more texts'],
		['mail', {}, 'no e-mail address']
	] as const)('is not sent by %s with %j', async (way, change, words) => {
		const { episodeId } = await withVisit(change);
		await expect(sendPage(coordinator(), episodeId, way)).rejects.toMatchObject({
			code: 'invalid',
			extra: { errors: [{ pointer: '/way', message: expect.stringContaining(words) }] }
		});
	});

	it('sent anew, the one before opens nothing', async () => {
		const { token, episodeId } = await withPage();
		await sendPage(coordinator(HOSPITAL_NOW + DAY_MS), episodeId, 'sms');
		await expect(readPage(holder(HOSPITAL_NOW + DAY_MS), token)).rejects.toMatchObject({
			code: 'link-ended'
		});
	});

	it('ended by hand, it opens nothing, and a message on its way is not sent', async () => {
		const { episodeId } = await withVisit();
		const { result } = await sendPage(coordinator(), episodeId, 'sms');
		await endPage(coordinator(), result.id);
		await bodySent(HOSPITAL_NOW + 1, /\/p\//, 'sms');
		const [message] = await db().select().from(outbox).where(eq(outbox.linkId, result.id));
		expect(message?.state).toBe('skipped');
		expect(await openLinkOf(db(), episodeId, HOSPITAL_NOW)).toBeNull();
		await expect(endPage(coordinator(), result.id)).rejects.toMatchObject({ code: 'wrong-state' });
	});

	it.each([
		[-1, 'opens it'],
		[0, 'does not']
	])('%i ms after its life it %s', async (late, what) => {
		const { token } = await withPage();
		const reading = readPage(holder(HOSPITAL_NOW + PAGE_LIFE_MS + late), token);
		await (what === 'opens it'
			? expect(reading).resolves.toMatchObject({ language: 'en' })
			: expect(reading).rejects.toMatchObject({ code: 'link-ended', status: 410 }));
	});

	it('made up, it is not there', async () => {
		await expect(readPage(holder(), 'x'.repeat(22))).rejects.toMatchObject({ code: 'not-found' });
		expect(await pageExists('x'.repeat(22))).toBe(false);
	});

	it.each(ROLES)('as %s', async (role) => {
		const { episodeId } = await withVisit();
		const work = sendPage(contextOf(hospital.people[role]), episodeId, 'sms');
		await (role === 'coordinator' || role === 'therapist'
			? expect(work).resolves.toMatchObject({ replayed: false })
			: expect(work).rejects.toMatchObject({ code: 'not-allowed' }));
	});

	it('of a patient of another unit is not there', async () => {
		const { linkId, episodeId } = await withPage();
		const stranger = contextOf({ ...hospital.people.coordinator, unitIds: ['elsewhere'] });
		await expect(sendPage(stranger, episodeId, 'sms')).rejects.toMatchObject({ code: 'not-found' });
		await expect(endPage(stranger, linkId)).rejects.toMatchObject({ code: 'not-found' });
	});
});

describe('the page', () => {
	it('shows the visits in the patient’s language, and nothing that tells who or why', async () => {
		const { token, patient } = await withPage({ language: 'es' });
		const page = await readPage(holder(), token);
		expect(page).toMatchObject({
			language: 'es',
			visits: [{ place: 'East Gym', state: 'planned', minutes: 45 }]
		});
		expect(JSON.stringify(page)).not.toMatch(
			new RegExp(`${patient.name}|bypass|${patient.phone.slice(4)}`, 'i')
		);
		expect(await languageOfPage(token)).toBe('es');
	});

	it('looked at a hundred times it changes nothing', async () => {
		const { token, visitId } = await withPage();
		const before = await db().$count(audit);
		for (let n = 0; n < 100; n += 1) {
			await readPage(holder(), token);
		}
		expect(await db().$count(audit)).toBe(before);
		expect(await stateOf(visitId)).toBe('planned');
	});

	it('its calendar file holds the visits ahead, also those that are cancelled, and is none without one', async () => {
		const { token, visitId } = await withPage();
		const events = (file: string) =>
			new ICAL.Component(ICAL.parse(file) as unknown as [string, object[], object[]]).getAllSubcomponents(
				'vevent'
			);
		const states = async () =>
			events((await calendarOfPage(holder(), token)) ?? '').map((event) =>
				event.getFirstPropertyValue('status')
			);
		expect(await states()).toEqual(['CONFIRMED']);
		await answerOnPage(holder(), token, deed(visitId, 'decline'));
		expect(await states()).toEqual(['CANCELLED']);
		await db().update(visits).set({ state: 'attended' }).where(eq(visits.id, visitId));
		expect(await calendarOfPage(holder(), token)).toBeNull();
	});
});

describe('an answer to a visit that has moved since the page was opened', () => {
	it.each(['confirm', 'decline'] as const)('%s is refused, and the new time stays as it is', async (what) => {
		const { token, visitId } = await withPage();
		const opened = (await readPage(holder(), token)).visits[0]?.sequence ?? -1;
		await rescheduleVisit(coordinator(), visitId, { startsAt: HOSPITAL_NOW + 8 * DAY_MS });
		const old = answerOnPage(holder(), token, deed(visitId, what, '', opened));
		await expect(old).rejects.toMatchObject({ code: 'wrong-state', extra: { state: 'moved' } });
		expect(await stateOf(visitId)).toBe('planned');
		const now = (await readPage(holder(), token)).visits[0]?.sequence ?? -1;
		expect((await answerOnPage(holder(), token, deed(visitId, 'confirm', '', now))).result.state).toBe(
			'confirmed'
		);
	});
});

describe('an answer on the page', () => {
	it('confirms, in the patient’s name, in the patient’s strand', async () => {
		const { token, visitId, threadId, patient } = await withPage();
		expect((await answerOnPage(holder(), token, deed(visitId, 'confirm'))).result.state).toBe('confirmed');
		const [row] = await db()
			.select()
			.from(audit)
			.where(and(eq(audit.action, 'visit.confirmed'), eq(audit.objectId, visitId)));
		expect(row).toMatchObject({
			actorKind: 'patient',
			actorId: patient.id,
			detail: { by: 'patient', way: 'page' }
		});
		const said = await db().select().from(entries).where(eq(entries.threadId, threadId));
		expect(said.at(-1)).toMatchObject({
			strand: 'patient',
			body: 'The patient confirmed the visit on Mon 9 Mar 10:00 on their page.'
		});
	});

	it('cancels with the patient’s words, and makes a loose end of the coordinator', async () => {
		const { token, visitId, threadId, episodeId } = await withPage();
		await answerOnPage(holder(), token, deed(visitId, 'decline', 'No bus that day.'));
		const said = await db().select().from(entries).where(eq(entries.threadId, threadId));
		expect(said.at(-1)?.body).toBe(
			'The patient cancelled the visit on Mon 9 Mar 10:00 on their page. Reason: No bus that day.'
		);
		const { mine } = await looseEndsOf(db(), hospital.people.coordinator, HOSPITAL_NOW);
		expect(mine.filter((end) => end.episodeId === episodeId).map(({ kind }) => kind)).toEqual([
			'visit-cancelled'
		]);
		// The patient has just done it themselves: no text tells them again.
		const texts = await db()
			.select()
			.from(outbox)
			.where(and(eq(outbox.refId, visitId), eq(outbox.kind, 'visit')));
		expect(texts).toEqual([]);
	});

	it('sent twice under its key is done once, and no key keeps the address', async () => {
		const { token, visitId, linkId } = await withPage();
		const key = { key: 'a-press', path: `/p/${token}`, digest: 'same' };
		const first = await answerOnPage(holder(HOSPITAL_NOW, key), token, deed(visitId, 'decline'));
		const again = await answerOnPage(holder(HOSPITAL_NOW, key), token, deed(visitId, 'decline'));
		expect([first.replayed, again.replayed]).toEqual([false, true]);
		const kept = await db().select().from(idempotencyKeys);
		expect(JSON.stringify(kept)).toContain(linkId);
		expect(JSON.stringify(kept)).not.toContain(token);
	});

	it.each([
		['to a visit that has begun', MONDAY, 'wrong-state'],
		['with a link that has ended', HOSPITAL_NOW + PAGE_LIFE_MS, 'link-ended']
	])('%s is refused', async (_, now, code) => {
		const { token, visitId } = await withPage();
		await expect(answerOnPage(holder(now), token, deed(visitId, 'confirm'))).rejects.toMatchObject({ code });
		expect(await stateOf(visitId)).toBe('planned');
	});

	it('to somebody else’s visit finds none', async () => {
		const { token } = await withPage();
		const { visitId } = await withVisit();
		const answer = answerOnPage(holder(), token, deed(visitId, 'decline'));
		await expect(answer).rejects.toMatchObject({ code: 'not-found' });
		expect(await stateOf(visitId)).toBe('planned');
	});
});
