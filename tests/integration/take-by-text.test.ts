import { randomBytes } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import type { Person } from '$lib/domain/access/actor';
import type { RaiseInput } from '$lib/domain/escalations/forms';
import { measureSms } from '$lib/domain/messages/sms-length';
import { db } from '$lib/server/db';
import {
	audit,
	coverShifts,
	entries,
	escalationLinks,
	escalations,
	inboundMessages,
	outbox,
	units,
	users
} from '$lib/server/db/schema';
import { withdrawEscalation } from '$lib/server/escalations/end';
import { passEscalation } from '$lib/server/escalations/pass';
import { heldReplyCodes } from '$lib/server/escalations/reply-code';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { takeEscalation } from '$lib/server/escalations/take';
import { newId } from '$lib/server/ids';
import { linkToken } from '$lib/server/links';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { ScriptedChannel } from '../support/channels';
import { callHook, signedPost } from '../support/hook-server';
import { HOSPITAL_NOW, addPatient, addPerson, addReferral, contextOf, newPhone } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

/** Replying TAKE to the text of an escalation, through the signed webhook and out again. */

const PUBLIC_URL = 'https://ropewalk.saltmarsh.example';
const MINUTE = 60 * 1000;
const HOUR = 60 * MINUTE;
const DAY = 24 * HOUR;
const INPUT: RaiseInput = {
	grade: 'high',
	situation: 'Systolic pressure fell from 128 to 108 after walking.',
	background: 'Bypass, day 5.',
	assessment: 'Fall of 20, limit 10.',
	request: 'Please come.'
};

const hospital = await openHospital({ PUBLIC_URL });
let sms: ScriptedChannel;
/** Each test has a ward and a nurse on cover of its own, so that nobody is sent the calls of another. */
let ward: string;
let nurse: Person;
let phone: string;

beforeEach(async () => {
	await db().update(outbox).set({ state: 'cancelled' });
	sms = new ScriptedChannel();
	ward = newId();
	await db()
		.insert(units)
		.values({ id: ward, name: `Ward ${ward.slice(-4)}`, kind: 'ward', zone: 'Europe/Dublin' });
	({ person: nurse, phone } = await staff('nurse'));
	await db()
		.insert(coverShifts)
		.values({
			id: newId(),
			unitId: ward,
			post: 'nurse',
			userId: nurse.id,
			startsAt: HOSPITAL_NOW - DAY,
			endsAt: HOSPITAL_NOW + DAY
		});
});

async function staff(role: Person['role'], unitIds = [ward]): Promise<{ person: Person; phone: string }> {
	const number = newPhone();
	return { person: await addPerson({ role, unitIds, phone: number }), phone: number };
}

async function send(now = HOSPITAL_NOW): Promise<void> {
	await new OutboxWorker({ channels: { sms, mail: null }, now: () => now, random: () => 0.5 }).settle();
}

/** A new patient of the ward about whom help was called, and the texts of the first step sent. */
async function called(bed = '4', now = HOSPITAL_NOW) {
	const { episodeId, patient } = await addPatient({ unitId: ward, bed });
	const { threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id });
	const raiser = { ...hospital.people.therapist, unitIds: [ward] };
	const { result } = await raiseEscalation(contextOf(raiser, now), episodeId, INPUT);
	await send(now);
	const { replyCode } = await escalationOf(result.id);
	return { id: result.id, code: replyCode ?? '', episodeId, patient, threadId, raiser };
}

async function escalationOf(id: string) {
	const [row] = await db().select().from(escalations).where(eq(escalations.id, id));
	if (!row) {
		throw new Error(`There is no escalation ${id}.`);
	}
	return row;
}

const newSid = () => `SM${randomBytes(16).toString('hex')}`;

/** Say it from a number, send what follows, and answer the texts that came back to that number. */
async function say(
	from: string,
	body: string,
	{ sid = newSid(), now = HOSPITAL_NOW } = {}
): Promise<string[]> {
	const fields = {
		AccountSid: `AC${'0'.repeat(32)}`,
		From: from,
		To: '+353860000000',
		Body: body,
		MessageSid: sid
	};
	expect((await callHook(signedPost(PUBLIC_URL, '/api/hooks/sms', fields), now)).status).toBe(200);
	const before = sms.sent.length;
	await send(now);
	return sms.sent
		.slice(before)
		.filter(({ to }) => to === from)
		.map((message) => message.body);
}

async function inbound(from: string) {
	const rows = await db().select().from(inboundMessages).where(eq(inboundMessages.fromNumber, from));
	return rows.at(-1);
}

async function loose(person: Person): Promise<string[]> {
	const { mine } = await looseEndsOf(db(), person, HOSPITAL_NOW);
	return mine.map(({ id }) => id);
}

describe('the text of an escalation', () => {
	it('carries unit, bed, grade, link and code, and nothing else, in one part', async () => {
		const { id, code } = await called();
		const [text, ...more] = sms.sent.filter(({ to }) => to === phone);
		expect(more).toEqual([]);
		const [link] = await db().select().from(escalationLinks).where(eq(escalationLinks.escalationId, id));
		expect(text?.body).toBe(
			`Ropewalk HIGH: Ward ${ward.slice(-4)}, bed 4. ` +
				`To take it open ${PUBLIC_URL}/t/${linkToken(link?.id ?? '')} or reply TAKE ${code}`
		);
		expect(code).toMatch(/^[2-9]{4}$/);
		expect(measureSms(text?.body ?? '')).toMatchObject({ encoding: 'gsm7', segments: 1 });
	});

	it('has a code that no other open call has', async () => {
		const calls = [await called('1'), await called('2'), await called('3')];
		expect(new Set(calls.map(({ code }) => code)).size).toBe(3);
		const [first, second] = calls;
		await expect(
			db()
				.update(escalations)
				.set({ replyCode: second?.code })
				.where(eq(escalations.id, first?.id ?? ''))
		).rejects.toThrow();
	});
});

describe('a code', () => {
	it('is nobody else’s while its call is open, and for twelve hours from its newest text', async () => {
		const { id, code, raiser } = await called();
		const later = HOSPITAL_NOW + 30 * HOUR;
		expect(await heldReplyCodes(db(), later)).toContain(code);
		await withdrawEscalation(contextOf(raiser, later), id, 'An error.');
		await db().update(escalationLinks).set({ createdAt: later }).where(eq(escalationLinks.escalationId, id));
		expect(await heldReplyCodes(db(), later + 12 * HOUR - 1)).toContain(code);
		expect(await heldReplyCodes(db(), later + 12 * HOUR)).not.toContain(code);
	});
});

describe('TAKE and the code', () => {
	it.each([
		['as it is asked for', (code: string) => `TAKE ${code}`],
		['in another case and with blanks', (code: string) => ` take  ${code} `],
		['run together', (code: string) => `Take${code}`],
		['in pairs, with more behind', (code: string) => `take ${code.slice(0, 2)} ${code.slice(2)}, there in 5`]
	])('%s takes it, on record, and the answer says so', async (_, words) => {
		const { id, code, threadId } = await called();
		const answers = await say(phone, words(code));
		expect(await escalationOf(id)).toMatchObject({
			state: 'taken',
			takenBy: nurse.id,
			takenAt: HOSPITAL_NOW,
			nextStepAt: null
		});
		const [link] = await db().select().from(escalationLinks).where(eq(escalationLinks.escalationId, id));
		expect(answers).toEqual([
			`Ropewalk HIGH: Ward ${ward.slice(-4)}, bed 4: it is yours. ${PUBLIC_URL}/t/${linkToken(link?.id ?? '')}`
		]);
		const onRecord = await db().select().from(audit).where(eq(audit.objectId, id));
		expect(onRecord.at(-1)).toMatchObject({ action: 'escalation.taken', actorId: nurse.id });
		expect(onRecord.at(-1)?.detail).toMatchObject({ via: 'text' });
		const lines = await db().select().from(entries).where(eq(entries.threadId, threadId));
		expect(lines.at(-1)).toMatchObject({ kind: 'answer', authorId: nurse.id, refId: id });
		expect(await inbound(phone)).toMatchObject({
			userId: nurse.id,
			understoodAs: 'take',
			handledAt: HOSPITAL_NOW
		});
	});

	it('stops the texts that have not left', async () => {
		const { id, code } = await called();
		const waiting = newId();
		await db()
			.insert(outbox)
			.values({
				id: waiting,
				kind: 'escalation',
				channel: 'sms',
				causeKey: waiting,
				userId: nurse.id,
				body: 'later',
				refKind: 'escalation',
				refId: id,
				state: 'ready',
				createdAt: HOSPITAL_NOW,
				nextAt: HOSPITAL_NOW + HOUR,
				expiresAt: HOSPITAL_NOW + DAY
			});
		await say(phone, `TAKE ${code}`);
		const [row] = await db().select().from(outbox).where(eq(outbox.id, waiting));
		expect(row?.state).toBe('cancelled');
	});

	it('takes it for a colleague of the unit who was not told, with an address to sign in at', async () => {
		const { id, code } = await called();
		const physician = await staff('physician');
		expect(await say(physician.phone, `TAKE ${code}`)).toEqual([
			`Ropewalk HIGH: Ward ${ward.slice(-4)}, bed 4: it is yours. ${PUBLIC_URL}/escalations/${id}`
		]);
		expect((await escalationOf(id)).takenBy).toBe(physician.person.id);
	});

	it('posted again by the gateway has no effect', async () => {
		const { id, code } = await called();
		const sid = newSid();
		await say(phone, `TAKE ${code}`, { sid });
		const count = await db().$count(audit);
		expect(await say(phone, `TAKE ${code}`, { sid, now: HOSPITAL_NOW + MINUTE })).toEqual([]);
		expect(await db().$count(audit)).toBe(count);
		expect(await escalationOf(id)).toMatchObject({ takenBy: nurse.id, takenAt: HOSPITAL_NOW });
	});

	it('said twice by the same person is confirmed twice and taken once', async () => {
		const { id, code } = await called();
		await say(phone, `TAKE ${code}`);
		const [answer] = await say(phone, `TAKE ${code}`, { now: HOSPITAL_NOW + MINUTE });
		expect(answer).toContain('it is yours');
		expect((await escalationOf(id)).takenAt).toBe(HOSPITAL_NOW);
	});

	it('of two at once takes one, and tells the other who has it by role and since when', async () => {
		const { id, code } = await called();
		const second = await staff('nurse');
		const fields = (From: string) => ({
			From,
			To: '+353860000000',
			Body: `TAKE ${code}`,
			MessageSid: newSid()
		});
		await Promise.all(
			[phone, second.phone].map((from) =>
				callHook(signedPost(PUBLIC_URL, '/api/hooks/sms', fields(from)), HOSPITAL_NOW)
			)
		);
		await send();
		const { takenBy } = await escalationOf(id);
		const late = takenBy === nurse.id ? second.phone : phone;
		expect(sms.sent.filter(({ to }) => to === late).at(-1)?.body).toBe(
			`Ropewalk HIGH: Ward ${ward.slice(-4)}, bed 4: NOT yours. A nurse has it since 09:00. Nothing is asked of you now.`
		);
	});

	it('confirms a call that was passed on to this person', async () => {
		const { id, code } = await called();
		const giver = await staff('physician');
		await takeEscalation(contextOf(giver.person), id, null);
		await passEscalation(contextOf(giver.person), id, { to: nurse.id, reason: 'Called to another bed.' });
		await send();
		const [answer] = await say(phone, `TAKE ${code}`);
		expect(answer).toContain('it is yours');
		expect(await escalationOf(id)).toMatchObject({ takenBy: nurse.id, passTo: null });
	});

	it('of one that is over takes nothing and says since when', async () => {
		const { id, code, raiser } = await called();
		await withdrawEscalation(contextOf(raiser, HOSPITAL_NOW + 5 * MINUTE), id, 'A mistake.');
		expect(await say(phone, `TAKE ${code}`, { now: HOSPITAL_NOW + HOUR })).toEqual([
			`Ropewalk HIGH: Ward ${ward.slice(-4)}, bed 4: NOT taken, it is over since 09:05. Nothing is asked of you now.`
		]);
	});

	it.each([
		['a code that no call has', () => '9'.repeat(6)],
		['the code of a call in another unit', (code: string) => code]
	])('%s: the same answer, and nothing taken', async (_, typed) => {
		const { id, code } = await called();
		const stranger = await staff('nurse', [hospital.units.icu]);
		const wrong = typed(code);
		expect(await say(stranger.phone, `TAKE ${wrong}`)).toEqual([
			`Ropewalk: NOT taken. No call that you may take has the code ${wrong}. Look at the code again, or open the link of the call.`
		]);
		expect((await escalationOf(id)).state).toBe('raised');
	});

	it.each(['therapist', 'speech-therapist', 'coordinator', 'admin'] as const)(
		'by a %s takes nothing, and says why',
		async (role) => {
			const { id, code } = await called();
			const other = await staff(role);
			expect(await say(other.phone, `TAKE ${code}`)).toEqual([
				'Ropewalk: NOT taken. Your account may not take calls. The call goes on to others.'
			]);
			expect((await escalationOf(id)).state).toBe('raised');
		}
	);
});

describe('TAKE alone', () => {
	it('takes the one call that was sent to this person', async () => {
		const { id } = await called();
		const [answer] = await say(phone, 'Take');
		expect(answer).toContain('it is yours');
		expect((await escalationOf(id)).takenBy).toBe(nurse.id);
	});

	it('takes none of two, and asks for the code', async () => {
		const [one, two] = [await called('1'), await called('2')];
		expect(await say(phone, 'TAKE')).toEqual([
			'Ropewalk: NOT taken. Several calls were sent to you. Reply TAKE and the code of one, or open its link.'
		]);
		for (const { id } of [one, two]) {
			expect((await escalationOf(id)).state).toBe('raised');
		}
	});

	it.each(['TAKE', 'ok coming'])('takes no other bed when somebody has the first: %s', async (words) => {
		const [one, two] = [await called('1'), await called('2')];
		const other = await staff('physician');
		await takeEscalation(contextOf(other.person), one.id, null);
		const [answer] = await say(phone, words);
		expect(answer).toContain('NOT taken');
		expect(answer).not.toContain(two.code);
		expect((await escalationOf(two.id)).state).toBe('raised');
		expect((await escalationOf(one.id)).takenBy).toBe(other.person.id);
	});

	it.each([
		['while the first could still be answered', 12 * HOUR - 1, 'raised'],
		['once its link has ended', 12 * HOUR, 'taken']
	])('of two over time, %s', async (_, later, state) => {
		const one = await called('1');
		await withdrawEscalation(contextOf(one.raiser), one.id, 'An error.');
		const two = await called('2', HOSPITAL_NOW + later);
		await say(phone, 'TAKE', { now: HOSPITAL_NOW + later });
		expect((await escalationOf(two.id)).state).toBe(state);
	});

	it('takes nothing that was not sent to this person', async () => {
		const { id } = await called();
		const other = await staff('nurse');
		expect(await say(other.phone, 'TAKE')).toEqual([
			'Ropewalk: NOT taken. No call that was sent to you is waiting. Sign in to see all of them.'
		]);
		expect((await escalationOf(id)).state).toBe('raised');
	});

	it('takes nothing whose text has not left', async () => {
		const { id } = await called();
		await db()
			.update(outbox)
			.set({ state: 'cancelled', sentAt: null, attempts: 0 })
			.where(and(eq(outbox.refId, id), eq(outbox.userId, nurse.id)));
		const [answer] = await say(phone, 'TAKE');
		expect(answer).toContain('NOT taken');
		expect((await escalationOf(id)).state).toBe('raised');
	});
});

describe('anything else from staff', () => {
	it.each(['ok coming', 'TAKE 4829 or 4823', '4829', 'PASS 4829', 'on my way!'])(
		'%j takes nothing, says what can be done with the code of the one call, and lands with nobody',
		async (body) => {
			const { id, code } = await called();
			expect(await say(phone, body)).toEqual([
				`Ropewalk: NOT taken, and nobody reads this. To take a call reply TAKE ${code}, or open its link.`
			]);
			expect((await escalationOf(id)).state).toBe('raised');
			const row = await inbound(phone);
			expect(row).toMatchObject({ userId: nurse.id, handledAt: HOSPITAL_NOW });
			expect(await loose(hospital.people.coordinator)).not.toContain(row?.id);
		}
	);

	it('without a call asks for no particular code', async () => {
		const [answer] = await say(phone, 'I am on the bus');
		expect(answer).toContain('reply TAKE and its code');
	});

	it('a telephone that answers by itself is answered once in ten minutes', async () => {
		const start = Math.ceil(HOSPITAL_NOW / (10 * MINUTE)) * 10 * MINUTE;
		const at = async (now: number, body = 'I am driving.') => (await say(phone, body, { now })).length;
		expect([await at(start), await at(start + 10 * MINUTE - 1), await at(start + 10 * MINUTE)]).toEqual([
			1, 0, 1
		]);
		expect(await at(start + 1, 'ok coming')).toBe(1);
	});

	it('STOP is for a person to see to, because no call reaches that number any more', async () => {
		expect(await say(phone, 'STOP')).toEqual([]);
		expect(await inbound(phone)).toMatchObject({
			userId: nurse.id,
			understoodAs: 'staff-stop',
			handledAt: null
		});
	});
});

describe('whose number it is', () => {
	it.each(['TAKE', 'ok coming'])('one of two colleagues takes nothing: %s', async (body) => {
		const { id, code } = await called();
		await addPerson({ role: 'nurse', unitIds: [ward], phone });
		expect(await say(phone, `${body} ${code}`)).toEqual([
			'Ropewalk: NOT taken. This number is on record for several people. Open the link of the call, or sign in.'
		]);
		expect((await escalationOf(id)).state).toBe('raised');
		expect(await inbound(phone)).toMatchObject({ userId: null, handledAt: HOSPITAL_NOW });
	});

	it('one of a nurse and a patient takes nothing, and a TAKE with a code is told so', async () => {
		const { id, code } = await called();
		await addPatient({ unitId: ward, phone });
		const [answer] = await say(phone, `TAKE ${code}`);
		expect(answer).toContain('on record for several people');
		expect((await escalationOf(id)).state).toBe('raised');
	});

	it.each([
		['that nobody has', () => Promise.resolve(newPhone())],
		[
			'of a disabled account',
			async () => {
				const given = await staff('nurse');
				await db().update(users).set({ disabledAt: HOSPITAL_NOW }).where(eq(users.id, given.person.id));
				return given.phone;
			}
		]
	])('one %s takes nothing, is told so once, and is looked into', async (_, numberOf) => {
		const { id, code } = await called();
		const number = await numberOf();
		expect(await say(number, `TAKE ${code}`)).toEqual([
			'Ropewalk: NOT taken. This number is on record for nobody who takes calls. Sign in to take it.'
		]);
		expect(await say(number, `TAKE ${code}`)).toEqual([]);
		expect((await escalationOf(id)).state).toBe('raised');
		expect(await inbound(number)).toMatchObject({ understoodAs: 'unknown-number', handledAt: null });
	});

	it('a patient’s number takes nothing whatever it says', async () => {
		const { id, code, patient } = await called();
		await say(patient.phone, `TAKE ${code}`);
		expect((await escalationOf(id)).state).toBe('raised');
		expect(await inbound(patient.phone)).toMatchObject({ patientId: patient.id, understoodAs: 'other' });
	});
});
