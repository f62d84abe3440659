import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { staleKeys } from '$lib/domain/live/events';
import type { LooseEnd } from '$lib/domain/loose-ends/loose-ends';
import { UNCONFIRMED_WITHIN_MS } from '$lib/domain/visits/limits';
import { db } from '$lib/server/db';
import { liveEvents, users } from '$lib/server/db/schema';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { refer } from '$lib/server/referrals/actions';
import { markSeen, postEntry } from '$lib/server/threads/actions';
import { listColleagues } from '$lib/server/threads/people';
import { getThread } from '$lib/server/threads/queries';
import { bookVisits, cancelVisit, confirmVisit } from '$lib/server/visits/actions';
import { addPatient, addPerson, addReferral, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
let episodeId: string;
let threadId: string;

type Who = keyof Hospital['people'];

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
	({ threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id }));
});

const as = (role: Who, now = hospital.now) => contextOf(hospital.people[role], now);

/** The loose ends of this test's patient. */
async function ends(role: Who, side: 'mine' | 'theirs', kind: LooseEnd['kind'], now = hospital.now) {
	const all = await looseEndsOf(db(), hospital.people[role], now);
	return all[side].filter((end) => end.episodeId === episodeId && end.kind === kind);
}

async function ask(role: Who = 'nurse', now = hospital.now): Promise<string> {
	const mentions = [hospital.people[role].id];
	const body = 'Is the drain to stay?';
	const { result } = await postEntry(as('therapist', now), threadId, { body, mentions });
	return result.asked[0]?.mentionId ?? '';
}

async function staleAfter(topic: string): Promise<string[]> {
	const rows = await db().select().from(liveEvents).where(eq(liveEvents.topic, topic));
	const last = rows.at(-1);
	return last
		? staleKeys({ topic: 'thread', kind: last.kind, id: last.subjectId, episodeId: last.episodeId }).map(
				([first]) => first
			)
		: [];
}

describe('a question put to somebody', () => {
	it('waits on them, is waited for by who asked, and is nobody else’s', async () => {
		const id = await ask();
		const [mine] = await ends('nurse', 'mine', 'mention');
		expect(mine).toMatchObject({
			id,
			threadId,
			title: 'Is the drain to stay?',
			askedBy: hospital.people.therapist.name,
			heldBy: hospital.people.nurse.name,
			code: 'nurse'
		});
		expect(await ends('therapist', 'theirs', 'mention')).toHaveLength(1);
		expect(await ends('physician', 'mine', 'mention')).toEqual([]);
		expect(await ends('nurse', 'theirs', 'mention')).toEqual([]);
	});

	it('is closed by their next entry in that thread, not by somebody else’s or one elsewhere', async () => {
		await ask();
		const elsewhere = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id });
		await postEntry(as('physician'), threadId, { body: 'I think so.' });
		await postEntry(as('nurse'), elsewhere.threadId, { body: 'Slept well.' });
		expect(await ends('nurse', 'mine', 'mention')).toHaveLength(1);
		await postEntry(as('nurse'), threadId, { body: 'Until tomorrow.' });
		expect(await ends('nurse', 'mine', 'mention')).toEqual([]);
		const { items } = await getThread(db(), hospital.people.nurse, threadId, { limit: 50, after: null });
		expect(items.flatMap(({ asked }) => asked)).toMatchObject([
			{ id: hospital.people.nurse.id, open: false }
		]);
	});

	it('is not closed by what they wrote before it', async () => {
		await postEntry(as('nurse'), threadId, { body: 'Slept well.' });
		await ask();
		expect(await ends('nurse', 'mine', 'mention')).toHaveLength(1);
	});

	it('is closed by saying that it was seen, once, and by nobody else', async () => {
		const id = await ask('coordinator');
		await expect(markSeen(as('nurse'), id)).rejects.toMatchObject({ code: 'not-allowed' });
		await markSeen(as('coordinator'), id);
		expect(await ends('coordinator', 'mine', 'mention')).toEqual([]);
		await expect(markSeen(as('coordinator'), id)).rejects.toMatchObject({ code: 'wrong-state', status: 409 });
		await expect(markSeen(contextOf(hospital.outsider), id)).rejects.toMatchObject({ code: 'not-found' });
	});

	it('makes the list of loose ends stale when it is put, and when it is closed', async () => {
		const id = await ask();
		expect(await staleAfter('thread')).toContain('loose-ends');
		await markSeen(as('nurse'), id);
		expect(await staleAfter('thread')).toContain('loose-ends');
	});

	it.each<[string, () => Promise<string> | string]>([
		['nobody', () => 'no-such-person'],
		['oneself', () => hospital.people.therapist.id],
		['somebody of another unit', () => hospital.outsider.id],
		['an administrator', () => hospital.people.admin.id],
		[
			'somebody whose account is disabled',
			async () => (await addPerson({ role: 'nurse', unitIds: [hospital.units.ward], disabledAt: 1 })).id
		]
	])('to %s is refused and names the member', async (_, who) => {
		const mentions = [hospital.people.nurse.id, await who()];
		await expect(postEntry(as('therapist'), threadId, { body: 'Well?', mentions })).rejects.toMatchObject({
			code: 'invalid',
			extra: { errors: [{ pointer: '/mentions/1' }] }
		});
		expect(await ends('nurse', 'mine', 'mention')).toEqual([]);
	});

	it('to one person twice is one question', async () => {
		const id = hospital.people.nurse.id;
		await postEntry(as('therapist'), threadId, { body: 'Well?', mentions: [id, id] });
		expect(await ends('nurse', 'mine', 'mention')).toHaveLength(1);
	});

	it('can be put to everybody active of the unit but oneself', async () => {
		const listed = await listColleagues(db(), hospital.people.therapist, episodeId);
		const active = await db().select({ id: users.id, role: users.role }).from(users);
		expect(listed.map(({ id }) => id)).toContain(hospital.people.coordinator.id);
		expect(listed.map(({ id }) => id)).not.toContain(hospital.people.therapist.id);
		expect(listed.filter(({ role }) => role === 'admin')).toEqual([]);
		expect(listed.length).toBeLessThan(active.length);
	});
});

describe('a referral that is asked', () => {
	it('shows its question and how soon', async () => {
		const input = { service: 'physiotherapy', priority: 'urgent', question: 'Begin today.' } as const;
		const other = await addPatient({ unitId: hospital.units.ward });
		episodeId = other.episodeId;
		await refer(as('surgeon'), episodeId, input);
		expect(await ends('therapist', 'mine', 'referral')).toMatchObject([
			{ title: 'Physiotherapy: Begin today.', priority: 'urgent' }
		]);
	});
});

describe('a visit that nobody has confirmed', () => {
	const START = Date.parse('2026-03-09T10:00:00Z');
	let id: string;

	beforeEach(async () => {
		const input = { kind: 'single', startsAt: START, minutes: 45, place: 'East Gym' } as const;
		id = (await bookVisits(as('coordinator'), episodeId, input)).result.items[0]?.id ?? '';
	});

	it.each([
		['before its time', START - UNCONFIRMED_WITHIN_MS - 1, 0],
		['from its time on', START - UNCONFIRMED_WITHIN_MS, 1],
		['until it begins', START - 1, 1],
		['once it begins', START, 0]
	])('%s', async (_, now, count) => {
		expect(await ends('coordinator', 'mine', 'visit-unconfirmed', now)).toHaveLength(count);
		expect(await ends('therapist', 'mine', 'visit-unconfirmed', now)).toEqual([]);
	});

	it.each([
		['confirmed', () => confirmVisit(as('coordinator'), id)],
		['cancelled', () => cancelVisit(as('coordinator'), id, 'He is ill.')]
	])('is none any more once it is %s', async (_, move) => {
		await move();
		expect(await ends('coordinator', 'mine', 'visit-unconfirmed', START - 1)).toEqual([]);
	});
});
