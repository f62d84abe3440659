import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { ROLES } from '$lib/domain/core/codes';
import { db } from '$lib/server/db';
import { audit, outbox, smsStatuses } from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';
import { listMessages, logFilterOf } from '$lib/server/messages/log';
import { exportLog } from '$lib/server/messages/log-export';
import { receiveStatus } from '$lib/server/messages/receive-status';
import { resendMessage } from '$lib/server/messages/resend';
import { settleMessage } from '$lib/server/messages/settle';
import { getStory } from '$lib/server/messages/story';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { accepted, permanent, ScriptedChannel, transient } from '../support/channels';
import { contextOf, HOSPITAL_NOW } from '../support/hospital';
import { addAlert, addEscalation, addReminder, addVisit, rowOf } from '../support/messages';
import { openHospital } from '../support/open-hospital';

/** How each message fared, for the administrator: found, told whole, sent again by hand, taken out as a table. */

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;

const hospital = await openHospital({ PORT: '4320' });
const admin = (now = HOSPITAL_NOW) => contextOf(hospital.people.admin, now);
const ALL = { limit: 200, after: null };
let sms: ScriptedChannel;
let now: number;

beforeEach(async () => {
	await db().update(outbox).set({ state: 'cancelled' });
	sms = new ScriptedChannel();
	now = HOSPITAL_NOW;
});

const settle = () =>
	new OutboxWorker({ channels: { sms, mail: null }, now: () => now, random: () => 0.5 }).settle();
const filter = (query: string) => logFilterOf(new URL(`http://ropewalk.example/admin/messages?${query}`));
const found = async (query: string) =>
	(await listMessages(admin(), filter(query), ALL)).items.map(({ id }) => id);
const reminder = async (change: Parameters<typeof addReminder>[2] = {}) =>
	addReminder(await addVisit(hospital), hospital.patient.id, change);
const alert = async () => (await addAlert(await addEscalation(hospital), hospital.people.nurse.id)).id;

describe('the log', () => {
	it.each(ROLES.filter((role) => role !== 'admin'))('is not for a %s', async (role) => {
		const context = contextOf(hospital.people[role]);
		const id = await reminder();
		await expect(listMessages(context, filter(''), ALL)).rejects.toMatchObject({ code: 'not-allowed' });
		await expect(getStory(context, id)).rejects.toMatchObject({ code: 'not-allowed' });
		await expect(exportLog(context, filter(''))).rejects.toMatchObject({ code: 'not-allowed' });
		await expect(resendMessage(context, id, { reason: 'x' })).rejects.toMatchObject({ code: 'not-allowed' });
	});

	it('is found by name of staff, number, words, identifier, state and channel', async () => {
		const call = await alert();
		const text = await reminder({ body: 'Half past nine, 100% sure.' });
		for (const [query, id] of [
			[`q=${encodeURIComponent(hospital.people.nurse.name)}`, call],
			[`q=${hospital.patient.phone.slice(3)}`, text],
			['q=half+past', text],
			['q=100%25', text],
			[`q=${text}`, text],
			['state=ready&channel=sms', call]
		] as const) {
			expect(await found(query)).toContain(id);
		}
		expect(await found('q=100_+sure')).not.toContain(text);
		expect(await found('channel=mail')).not.toContain(call);
		expect(await found('state=failed')).not.toContain(text);
	});

	it('knows no name of a patient, and cannot be asked for one', async () => {
		const id = await reminder();
		expect(await found(`q=${encodeURIComponent(hospital.patient.name)}`)).toEqual([]);
		const story = JSON.stringify(await getStory(admin(), id));
		expect(story).not.toContain(hospital.patient.name);
		expect(story).not.toContain(hospital.patient.phone);
		expect(story).toContain(hospital.patient.phone.slice(-4));
	});

	it('turns its pages without a gap, also where several were written at once', async () => {
		const ids = await Promise.all(Array.from({ length: 5 }, () => reminder({ subject: 'paged' })));
		const seen: string[] = [];
		let after: string | null = null;
		do {
			const page = await listMessages(admin(), filter('q=paged'), { limit: 2, after });
			seen.push(...page.items.map(({ id }) => id));
			after = page.next;
		} while (after !== null);
		expect(seen).toHaveLength(5);
		expect(new Set(seen)).toEqual(new Set(ids));
	});

	it.each(['state=lost', 'channel=pigeon'])('what is not known is no filter: %s', async (query) => {
		expect(await found(query)).toEqual(await found(''));
	});
});

describe('the story', () => {
	it('tells cause, attempts, the gateway’s answers and callbacks in order', async () => {
		sms.script = [transient(), accepted('SM-story')];
		const id = await alert();
		await settle();
		now += 5_000;
		await settle();
		for (const status of ['sent', 'delivered', 'sent']) {
			now += 1_000;
			const form = new Map([
				['MessageSid', 'SM-story'],
				['MessageStatus', status]
			]);
			await receiveStatus(form, now);
		}
		const story = await getStory(admin(), id);
		expect(story).toMatchObject({
			state: 'delivered',
			providerId: 'SM-story',
			cause: { kind: 'escalation' }
		});
		expect(
			story.events.map((event) => {
				switch (event.what) {
					case 'attempt':
						return `${event.number} ${event.outcome} ${event.code}`;
					case 'told':
						return event.status;
					default:
						return event.what;
				}
			})
		).toEqual(['written', '1 transient 500', '2 accepted null', 'sent', 'delivered']);
	});

	it('shows the place of the secret link, and never the link', async () => {
		const id = await alert();
		await settle();
		expect((await getStory(admin(), id)).body).toContain('{link}');
	});

	it('of no message is not there', async () => {
		await expect(getStory(admin(), newId())).rejects.toMatchObject({ code: 'not-found' });
	});
});

describe('sent again by hand', () => {
	async function failed() {
		sms.script = [permanent('bad-address', '21211')];
		const id = await reminder();
		await settle();
		expect((await rowOf(id)).state).toBe('failed');
		return id;
	}

	it('goes out once more, the same message, with who and why on record', async () => {
		const id = await failed();
		await resendMessage(admin(), id, { reason: 'The number was put right.' });
		await settle();
		expect(sms.sent).toHaveLength(2);
		expect(await rowOf(id)).toMatchObject({ state: 'accepted', attempts: 2 });
		const { events } = await getStory(admin(), id);
		expect(events).toContainEqual(
			expect.objectContaining({
				what: 'resent',
				by: hospital.people.admin.name,
				reason: 'The number was put right.'
			})
		);
		const rows = await db().select().from(audit).where(eq(audit.objectId, id));
		const resent = rows.find(({ action }) => action === 'message.resent');
		expect(resent).toMatchObject({ actorId: hospital.people.admin.id });
		expect(JSON.stringify(resent)).not.toContain('put right');
	});

	it('begins its schedule anew', async () => {
		sms.script = [transient(), transient(), transient(), transient(), transient(), transient()];
		const id = await alert();
		for (const seconds of [0, 5, 15, 45]) {
			now += seconds * 1_000;
			await settle();
		}
		expect((await rowOf(id)).state).toBe('failed');
		now += MINUTE;
		await resendMessage(admin(now), id, { reason: 'The gateway is back.' });
		await settle();
		expect(await rowOf(id)).toMatchObject({ state: 'ready', attempts: 5, nextAt: now + 2_500 });
	});

	it('twice at once is sent once', async () => {
		const id = await failed();
		const twice = [1, 2].map(() => resendMessage(admin(), id, { reason: 'Once more.' }));
		const ends = await Promise.allSettled(twice);
		expect(ends.map(({ status }) => status).toSorted()).toEqual(['fulfilled', 'rejected']);
		await settle();
		expect(sms.sent).toHaveLength(2);
	});

	it('is checked again: what is not wanted any more is skipped', async () => {
		const id = await failed();
		await db().run(`update visits set state = 'cancelled'`);
		await resendMessage(admin(), id, { reason: 'Once more.' });
		await settle();
		expect(await rowOf(id)).toMatchObject({ state: 'skipped', stateReason: 'visit is over or cancelled' });
	});

	it('is nobody’s to see to while it is under way', async () => {
		const id = await failed();
		await settleMessage(contextOf(hospital.people.coordinator), id);
		await resendMessage(admin(), id, { reason: 'Once more.' });
		sms.script = [permanent('bad-address')];
		await settle();
		expect(await rowOf(id)).toMatchObject({ state: 'failed', handledAt: null });
	});

	it.each(['ready', 'sending', 'held', 'delivered', 'skipped', 'cancelled'] as const)(
		'one that is %s is refused',
		async (state) => {
			const id = await reminder();
			await db().update(outbox).set({ state }).where(eq(outbox.id, id));
			await expect(resendMessage(admin(), id, { reason: 'x' })).rejects.toMatchObject({
				code: 'wrong-state'
			});
		}
	);

	it.each([
		['just before', -1, 'ready'],
		['at', 0, 'failed'],
		['after', 1, 'failed']
	])('a reminder %s its end', async (_, offset, state) => {
		const id = await failed();
		const at = (await rowOf(id)).expiresAt + offset;
		await resendMessage(admin(at), id, { reason: 'x' }).catch(() => null);
		expect((await rowOf(id)).state).toBe(state);
	});

	it('an alert gets its hour again', async () => {
		sms.script = [permanent('refused')];
		const id = await alert();
		await settle();
		await resendMessage(admin(HOSPITAL_NOW + 3 * HOUR), id, { reason: 'x' });
		expect((await rowOf(id)).expiresAt).toBe(HOSPITAL_NOW + 4 * HOUR);
	});
});

describe('the export', () => {
	it('is what the filter leaves, without words of messages, and is on record', async () => {
		const id = await reminder({ body: 'Secret words.' });
		await db().update(outbox).set({ state: 'failed', stateReason: '=cmd' }).where(eq(outbox.id, id));
		const before = await db().$count(audit, eq(audit.action, 'message-log.exported'));
		const lines = (await exportLog(admin(), filter(`q=${id}`))).trimEnd().split('\r\n');
		expect(lines[0]).toBe('id,written,kind,channel,to,state,reason,attempts');
		expect(lines).toHaveLength(2);
		expect(lines[1]).toContain(`${id},`);
		expect(lines[1]).toContain("failed,'=cmd,0");
		expect(lines.join()).not.toContain('Secret');
		expect(await db().$count(audit, eq(audit.action, 'message-log.exported'))).toBe(before + 1);
	});
});

it('what the gateway told of a first sending stays in the story after a second', async () => {
	sms.script = [accepted('SM-first'), accepted('SM-second')];
	const id = await reminder();
	await settle();
	await db()
		.insert(smsStatuses)
		.values({ id: newId(), providerId: 'SM-first', status: 'undelivered', errorCode: '30003', at: now + 1 });
	await db().update(outbox).set({ state: 'undelivered' }).where(eq(outbox.id, id));
	now += MINUTE;
	await resendMessage(admin(now), id, { reason: 'x' });
	await settle();
	const { events, providerId } = await getStory(admin(), id);
	expect(providerId).toBe('SM-second');
	expect(events).toContainEqual(expect.objectContaining({ what: 'told', errorCode: '30003' }));
});
