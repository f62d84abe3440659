import { createServer, type IncomingMessage, type Server } from 'node:http';
import { once } from 'node:events';
import type { AddressInfo } from 'node:net';
import { eq, sql } from 'drizzle-orm';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { POSTS } from '$lib/domain/core/codes';
import { LINE_KINDS } from '$lib/domain/lines/codes';
import { admitBody } from '$lib/domain/episodes/forms';
import { verifyAudit } from '$lib/server/audit/verify';
import { passwordFits } from '$lib/server/auth/passwords';
import { onCover } from '$lib/server/cover/queries';
import { db } from '$lib/server/db';
import {
	audit,
	coverShifts,
	episodes,
	outbox,
	patients,
	settings,
	units,
	users
} from '$lib/server/db/schema';
import { listEpisodes } from '$lib/server/episodes/list';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { loadPerson } from '$lib/server/auth/people';
import { now } from '$lib/server/clock';
import { env } from '$lib/server/env';
import { admitPatient } from '$lib/server/episodes/actions';
import { prepareHospital } from '$lib/server/setup';
import { Calendar } from '$lib/server/setup/demonstration/calendar';
import { foundHospital } from '$lib/server/setup/demonstration/found';
import { loadDemonstration } from '$lib/server/setup/demonstration/load';
import { DEMO_PASSWORD } from '$lib/server/setup/demonstration/people';
import { kindOfDatabase } from '$lib/server/setup/mark';
import { freshDatabase } from '../support/database';
import { testEnvironment } from '../support/environment';
import { makeHospital } from '../support/hospital';

const DAY = 24 * 60 * 60 * 1000;

/** Hears whose phones they are, in place of the SMS gateway. */
const phones: { server: Server; named: Promise<string> } = listen();
await once(phones.server, 'listening');
const { port } = phones.server.address() as AddressInfo;
const { remove } = testEnvironment({ FAKE_SMS_PORT: String(port) });

function listen() {
	let heard: (body: string) => void = () => {};
	const named = new Promise<string>((resolve) => (heard = resolve));
	const server = createServer((request, response) => {
		void textOf(request).then((body) => heard(`${request.method} ${request.url} ${body}`));
		response.end('{}');
	}).listen(0, '127.0.0.1');
	return { server, named };
}

async function textOf(request: IncomingMessage): Promise<string> {
	let text = '';
	for await (const chunk of request) {
		text += String(chunk);
	}
	return text;
}

afterAll(() => {
	phones.server.close();
	remove();
});

async function personAt(email: string) {
	const [user] = await db()
		.select()
		.from(users)
		.where(eq(users.email, `${email}@saltmarsh.example`));
	const person = user && (await loadPerson(db(), user.id));
	if (!person) {
		throw new Error(`${email} is missing.`);
	}
	return person;
}

const statesOf = async (table: string, column = 'state') => {
	const name = sql.identifier(column);
	const rows = await db().all<{ state: string; n: number }>(
		sql`select ${name} as state, count(*) as n from ${sql.identifier(table)} group by 1`
	);
	return Object.fromEntries(rows.map(({ state, n }) => [state, n]));
};

describe('the demonstration hospital', () => {
	/** Monday 12 October 2026, 14:20 in Dublin. */
	const START = Date.parse('2026-10-12T13:20:00Z');
	let close: () => void;
	beforeAll(async () => {
		({ close } = await freshDatabase());
		await loadDemonstration(START);
	});
	afterAll(() => close());

	it('has three units, staff in every role and patients from day 0 to week 10', async () => {
		expect((await db().select().from(units)).map(({ name, kind }) => `${name}: ${kind}`)).toEqual(
			expect.arrayContaining(['Heron Unit: intensive-care', 'Tern Ward: ward', 'East Gym: gym'])
		);
		const staff = await db().select().from(users);
		expect(staff).toHaveLength(12);
		expect(new Set(staff.map(({ role }) => role)).size).toBe(7);
		expect(new Set(staff.map(({ phone }) => phone)).size).toBe(12);
		const { items } = await listEpisodes(db(), await personAt('nurse'), START, null, {
			limit: 50,
			after: null
		});
		expect(items.map(({ postOpDay }) => postOpDay).sort((a, b) => Number(a) - Number(b))).toEqual([
			0, 1, 3, 3, 4, 5, 6, 6, 7, 8, 28, 42, 56, 70
		]);
		expect(new Set(items.map(({ level }) => level)).size).toBeGreaterThanOrEqual(5);
		expect(new Set((await db().select().from(patients)).map(({ mrn }) => mrn)).size).toBe(14);
	});

	it.each(['surgeon', 'physician', 'nurse', 'nurse2', 'therapist', 'speech', 'coordinator', 'admin'])(
		'lets one be %s@, in all three units',
		async (name) => {
			const email = `${name}@saltmarsh.example`;
			const [user] = await db().select().from(users).where(eq(users.email, email));
			expect(await passwordFits(user?.passwordHash ?? null, DEMO_PASSWORD)).toBe(true);
			expect((await personAt(name)).unitIds).toHaveLength(3);
		}
	);

	it('has every kind of answer in its threads', async () => {
		expect(await statesOf('referrals')).toMatchObject({
			asked: 1,
			declined: 1,
			accepted: expect.any(Number)
		});
		const kinds = await db().all<{ kind: string; state: string; limits: string | null }>(
			sql`select kind, state, limits from clearances`
		);
		const arms = kinds.filter(({ kind }) => kind === 'arm-stage');
		expect(arms.map(({ state }) => state).sort()).toEqual(['asked', 'given-with-limits', 'withheld']);
		expect(arms.map(({ limits }) => limits ?? '').join()).toContain('"maxElevationDeg":90');
		expect(await statesOf('bedside_sessions', 'outcome')).toMatchObject({
			stop: 1,
			caution: expect.any(Number),
			clear: expect.any(Number)
		});
		expect(Object.keys(await statesOf('entries', 'strand')).sort()).toEqual([
			'medical',
			'nursing',
			'patient',
			'therapy'
		]);
	});

	it('has fewer lines in its patients each day, and none from day 4', async () => {
		const all = { limit: 50, after: null };
		const { items } = await listEpisodes(db(), await personAt('nurse'), START, null, all);
		const byDay = items.map(
			({ postOpDay, lines, oxygen }) => [postOpDay, lines, oxygen?.lpm ?? null] as const
		);
		expect(byDay.filter(([day]) => Number(day) < 5).sort(([a], [b]) => Number(a) - Number(b))).toEqual([
			[0, [...LINE_KINDS], null],
			[1, ['central-line', 'peripheral-line', 'chest-drain', 'pacing-wires', 'urinary-catheter'], 2],
			[3, ['central-line', 'peripheral-line', 'pacing-wires', 'urinary-catheter'], 4],
			[3, ['peripheral-line', 'chest-drain'], 0],
			[4, [], 0]
		]);
		expect(byDay.filter(([day, there]) => Number(day) > 4 && there.length > 0)).toEqual([]);
	});

	it('is quiet: one call is taken, one settled, and nothing old is left to be sent', async () => {
		expect(await statesOf('escalations')).toEqual({ taken: 1, settled: 1 });
		const waiting = await db().select().from(outbox).where(eq(outbox.state, 'ready'));
		expect(waiting.length).toBeGreaterThan(0);
		expect(waiting.every(({ kind, nextAt }) => kind === 'reminder' && nextAt > START)).toBe(true);
		const { accepted = 0, ready = 0, ...others } = await statesOf('outbox');
		expect({ sent: accepted > 0, ready: ready > 0, others }).toEqual({ sent: true, ready: true, others: {} });
		const overdue = await db().all(
			sql`select id from escalations where next_step_at is not null or recheck_due_at > recheck_done_at`
		);
		expect(overdue).toHaveLength(0);
	});

	it.each([
		['surgeon', ['clearance', 'clearance', 'precautions-due']],
		['physician', ['clearance']],
		['therapist', ['referral']],
		['nurse2', ['escalation-taken']],
		['nurse', []]
	])('leaves %s with their own loose ends', async (name, kinds) => {
		const { mine } = await looseEndsOf(db(), await personAt(name), START);
		expect(mine.map(({ kind }) => kind)).toEqual(kinds);
	});

	it('has a visit for each of the next days of the week, and all that are over are decided', async () => {
		const rows = await db().all<{ state: string; startsAt: number }>(
			sql`select state, starts_at as "startsAt" from visits`
		);
		const open = rows.filter(({ state }) => state === 'planned' || state === 'confirmed');
		expect(open.filter(({ startsAt }) => startsAt < START - DAY / 4)).toHaveLength(0);
		expect(open.filter(({ startsAt }) => startsAt < START + 7 * DAY).length).toBeGreaterThanOrEqual(8);
		expect(new Set(rows.map(({ state }) => state))).toEqual(
			new Set(['planned', 'confirmed', 'attended', 'missed'])
		);
	});

	it.each([-70, -1, 0, 0.5, 1, 200, 366])('has every post covered %s days from now', async (days) => {
		const at = START + days * DAY;
		for (const { id, name } of await db().select().from(units)) {
			for (const post of POSTS) {
				const found = await onCover(db(), id, post, at);
				expect(found, `${post} of ${name}`).toHaveLength(1);
				expect(found[0]?.phone).toMatch(/^\+35386\d{7}$/);
			}
		}
	});

	it('lets shifts follow each other without gap or overlap', async () => {
		const shifts = await db()
			.select()
			.from(coverShifts)
			.where(eq(coverShifts.post, 'nurse'))
			.orderBy(coverShifts.unitId, coverShifts.startsAt);
		const broken = shifts.filter((shift, index) => {
			const before = shifts[index - 1];
			return before?.unitId === shift.unitId && before.endsAt !== shift.startsAt;
		});
		expect(broken).toHaveLength(0);
	});

	it('has an audit chain that verifies, in the order of time', async () => {
		expect(await verifyAudit(db())).toMatchObject({ intact: true });
		const rows = await db().select({ at: audit.at }).from(audit).orderBy(audit.seq);
		expect(rows.map(({ at }) => at)).toEqual(rows.map(({ at }) => at).sort((a, b) => a - b));
		expect(rows.at(-1)?.at).toBe(START);
	});

	it('is loaded once, and names the owners of its phones at each start', async () => {
		const before = await db().$count(episodes);
		await prepareHospital();
		expect(await db().$count(episodes)).toBe(before);
		const named = await phones.named;
		expect(named).toMatch(/^PUT \/phones /);
		expect(named).toContain('{"number":"+353861000003","owner":"Rona Ferris, nurse"}');
		expect(named).toContain('{"number":"+353862000006","owner":"Matthias Reeve, patient"}');
	});
});

describe('started at another hour', () => {
	let close = () => {};
	afterEach(() => close());

	it.each([
		['just after midnight on the day when clocks go forward', '2026-03-29T00:04:00Z'],
		['in the hour that happens twice', '2026-10-25T01:30:00Z'],
		['in the last minute of a summer day', '2026-07-10T22:59:00Z'],
		['at noon on a leap day', '2028-02-29T12:00:00Z']
	])('%s it is the same hospital', async (_, iso) => {
		({ close } = await freshDatabase());
		const start = Date.parse(iso);
		await loadDemonstration(start);
		const { items } = await listEpisodes(db(), await personAt('nurse'), start, null, {
			limit: 50,
			after: null
		});
		const days = items.map(({ postOpDay }) => Number(postOpDay)).sort((a, b) => a - b);
		expect(days).toEqual([0, 1, 3, 3, 4, 5, 6, 6, 7, 8, 28, 42, 56, 70]);
		const rows = await db().select({ at: audit.at }).from(audit).orderBy(audit.seq);
		expect(rows.every(({ at }, index) => at >= (rows[index - 1]?.at ?? 0) && at <= start)).toBe(true);
	});
});

describe('a database that was not made as a demonstration', () => {
	let close = () => {};
	afterEach(() => close());

	it('is refused when somebody has an account in it, and left as it is', async () => {
		({ close } = await freshDatabase());
		await makeHospital();
		const before = await db().$count(users);
		await expect(prepareHospital()).rejects.toThrow(
			/DEMO=1 needs a database that was made as a demonstration/
		);
		expect(await db().$count(users)).toBe(before);
		expect(await db().$count(settings)).toBe(0);
	});
});

describe('a demonstration whose making was interrupted', () => {
	let close = () => {};
	afterEach(() => close());

	it('is made anew at the next start, and is complete then', async () => {
		({ close } = await freshDatabase());
		const { zone } = env().hospital;
		const { people } = await foundHospital(new Calendar(now(), zone), now() - 80 * DAY);
		const patient = { name: 'Left Over', birthDate: '1950-01-31', sex: 'female', mrn: 'LEFT-1' };
		await admitPatient(
			{ actor: people.nurse, now: now() - 79 * DAY, address: null, key: null },
			admitBody.parse({ patient, unit: 'Tern Ward', bed: 'T3' })
		);
		expect(await kindOfDatabase()).toBe('unfinished');
		await prepareHospital();
		expect(await kindOfDatabase()).toBe('demonstration');
		expect(await db().$count(users)).toBe(12);
		expect(await db().$count(episodes)).toBe(14);
		expect(await db().$count(patients, eq(patients.mrn, 'LEFT-1'))).toBe(0);
		expect(await verifyAudit(db())).toMatchObject({ intact: true });
	});
});
