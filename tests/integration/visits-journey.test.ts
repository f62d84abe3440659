import { eq } from 'drizzle-orm';
import { expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { outbox, visits } from '$lib/server/db/schema';
import { env } from '$lib/server/env';
import { listen } from '$lib/server/live/hub';
import { openChannels } from '$lib/server/outbox/channels';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { bookVisits } from '$lib/server/visits/actions';
import { listVisits } from '$lib/server/visits/queries';
import { openGateway } from '../support/open-gateway';
import { HOSPITAL_NOW, addReferral, contextOf } from '../support/hospital';

/** A visit from the booking to the patient's answer, through the real SDK, real SMTP and the signed webhooks. */

const DAY = 24 * 60 * 60 * 1000;
const STARTS_AT = Date.parse('2026-03-09T10:00:00Z');

const { hooks, gateway, hospital } = await openGateway();

/** Resolves when a message of this state is announced to pages. */
function announced(state: string): Promise<string> {
	return new Promise((resolve) => {
		const stop = listen((event) => {
			if (event.topic === 'message' && event.kind === state) {
				stop();
				resolve(event.id);
			}
		});
	});
}

async function settleAt(now: number): Promise<void> {
	hooks.now = now;
	await new OutboxWorker({ channels: openChannels(env()), now: () => now }).settle();
}

async function book() {
	const context = contextOf(hospital.people.coordinator);
	const input = { kind: 'single', startsAt: STARTS_AT, minutes: 45, place: 'East Gym' } as const;
	const { result } = await bookVisits(context, hospital.episodeId, input);
	return result.items[0]?.id ?? '';
}

async function stateOf(visitId: string) {
	const [row] = await db().select().from(visits).where(eq(visits.id, visitId));
	return row?.state;
}

it('reminds when due, hears of the delivery, and a YES confirms', async () => {
	const { surgeon } = hospital.people;
	await addReferral({ episodeId: hospital.episodeId, askedBy: surgeon.id });
	const { phone, name } = hospital.patient;
	const visitId = await book();
	await settleAt(HOSPITAL_NOW);

	const [mail] = await gateway.mails();
	expect(mail).toMatchObject({ subject: 'Ropewalk: something to read' });
	expect(mail?.text).toContain(`${hooks.url}/patients/${hospital.episodeId}/visits`);
	expect(await gateway.messagesOf(phone)).toEqual([]);

	const delivered = announced('delivered');
	await settleAt(Date.parse('2026-03-07T17:00:00Z'));
	const reminderId = await delivered;
	const [reminder, ...more] = await gateway.messagesOf(phone);
	expect(more).toEqual([]);
	expect(reminder?.body).toContain('your visit is Mon 9 Mar 10:00, East Gym. Reply YES or NO.');
	for (const word of [...name.split(' '), 'sternotomy', 'bypass', 'Tern']) {
		expect(reminder?.body).not.toContain(word);
	}
	const [row] = await db().select().from(outbox).where(eq(outbox.id, reminderId));
	expect(row).toMatchObject({ kind: 'reminder', state: 'delivered', providerId: reminder?.sid });

	expect(await gateway.reply(phone, 'Yes')).toBe(200);
	expect(await stateOf(visitId)).toBe('confirmed');
	await settleAt(hooks.now);
	expect((await gateway.messagesOf(phone)).at(-1)?.body).toContain('thank you, see you Mon 9 Mar 10:00');

	await settleAt(Date.parse('2026-03-08T17:00:00Z'));
	expect((await gateway.messagesOf(phone)).at(-1)?.body).toContain('Reply NO if you cannot come');
	const { items } = await listVisits(hospital.people.therapist, { from: STARTS_AT, to: STARTS_AT + DAY });
	expect(items[0]?.reminders.map(({ state }) => state)).toEqual([
		'delivered',
		expect.stringMatching(/^(accepted|delivered)$/)
	]);
});

it('a NO cancels, and no reminder follows, whatever callbacks come twice', async () => {
	await gateway.fault('sms', 'duplicate-callbacks');
	const { phone } = hospital.patient;
	await db().update(visits).set({ state: 'attended' });
	// The days are lived again: what was sent in them before is long past.
	await db()
		.update(outbox)
		.set({ sentAt: HOSPITAL_NOW - DAY });
	const visitId = await book();
	const delivered = announced('delivered');
	await settleAt(Date.parse('2026-03-07T17:00:00Z'));
	await delivered;
	expect(await gateway.reply(phone, 'NO')).toBe(200);
	expect(await stateOf(visitId)).toBe('cancelled');
	await settleAt(hooks.now);
	const count = (await gateway.messagesOf(phone)).length;
	await settleAt(Date.parse('2026-03-08T17:00:00Z'));
	expect(await gateway.messagesOf(phone)).toHaveLength(count);
});

it('one that did not arrive is told apart', async () => {
	await gateway.fault('sms', 'undelivered');
	await db().update(visits).set({ state: 'attended' });
	await book();
	const undelivered = announced('undelivered');
	await settleAt(Date.parse('2026-03-07T17:00:00Z'));
	const [row] = await db()
		.select()
		.from(outbox)
		.where(eq(outbox.id, await undelivered));
	expect(row).toMatchObject({ kind: 'reminder', stateReason: 'undelivered, gateway code 30003' });
});
