import { eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { inboundMessages, outbox } from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';
import { forgetOldWords } from '$lib/server/messages/forget';
import { getStory } from '$lib/server/messages/story';
import { contextOf, HOSPITAL_NOW, newPhone } from '../support/hospital';
import { addReminder, addVisit, rowOf } from '../support/messages';
import { openHospital } from '../support/open-hospital';

/** What messages said is removed some time after their end; that they were sent, and how they fared, is kept. */

const DAY = 24 * 60 * 60_000;
const hospital = await openHospital({ PORT: '4330' });

async function message(change: Partial<typeof outbox.$inferInsert>): Promise<string> {
	const id = await addReminder(await addVisit(hospital), hospital.patient.id);
	await db().update(outbox).set(change).where(eq(outbox.id, id));
	return id;
}

async function received(change: Partial<typeof inboundMessages.$inferInsert> = {}): Promise<string> {
	const id = newId();
	await db()
		.insert(inboundMessages)
		.values({
			...{
				id,
				providerId: id,
				fromNumber: newPhone(),
				body: 'Hello',
				at: HOSPITAL_NOW,
				understoodAs: 'other'
			},
			handledAt: HOSPITAL_NOW,
			...change
		});
	return id;
}

const bodyOf = async (id: string) =>
	(await db().select().from(inboundMessages).where(eq(inboundMessages.id, id)))[0]?.body;

describe('words of ours', () => {
	it.each([
		['just under thirty days', -1, true],
		['at thirty days', 0, false],
		['over thirty days', 1, false]
	])('%s after its end', async (_, offset, kept) => {
		const id = await message({ state: 'delivered', subject: 'A visit', calendar: 'BEGIN:VCALENDAR' });
		await forgetOldWords(HOSPITAL_NOW + 30 * DAY + offset);
		const row = await rowOf(id);
		expect(row.body !== '').toBe(kept);
		expect([row.subject, row.calendar].some(Boolean)).toBe(kept);
		expect(row).toMatchObject({ state: 'delivered', kind: 'reminder', attempts: 0 });
		expect((await getStory(contextOf(hospital.people.admin), id)).body === null).toBe(!kept);
	});

	it.each([
		['ready', {}, true],
		['sending', {}, true],
		['held', {}, true],
		['failed', {}, true],
		['undelivered', {}, true],
		['failed', { handledAt: HOSPITAL_NOW }, false],
		['failed', { kind: 'notice' }, false],
		['failed', { refKind: 'account' }, false],
		['skipped', {}, false],
		['cancelled', {}, false],
		['accepted', {}, false]
	] as const)('of a message that is %s %j', async (state, change, kept) => {
		const id = await message({ state, ...change });
		await forgetOldWords(HOSPITAL_NOW + 31 * DAY);
		expect((await rowOf(id)).body !== '').toBe(kept);
	});
});

describe('words of others', () => {
	it.each([
		['just under a year', -1, 'Hello'],
		['at a year', 0, '']
	])('%s', async (_, offset, body) => {
		const id = await received();
		await forgetOldWords(HOSPITAL_NOW + 365 * DAY + offset);
		expect(await bodyOf(id)).toBe(body);
	});

	it('stay until somebody has read them', async () => {
		const id = await received({ handledAt: null });
		await forgetOldWords(HOSPITAL_NOW + 366 * DAY);
		expect(await bodyOf(id)).toBe('Hello');
	});
});

it('many are removed in rounds, until none is left', async () => {
	const ids = await Promise.all(Array.from({ length: 501 }, () => received()));
	expect(await forgetOldWords(HOSPITAL_NOW + 366 * DAY)).toBe(500);
	await forgetOldWords(HOSPITAL_NOW + 366 * DAY);
	expect(await bodyOf(ids.at(-1) ?? '')).toBe('');
});
