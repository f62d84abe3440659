import { desc, eq, sql } from 'drizzle-orm';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { Problem } from '$lib/domain/core/errors';
import { signIn, signOut } from '$lib/server/accounts/sign-in';
import { endSignInsOver } from '$lib/server/accounts/sign-in-ends';
import { SIGN_IN_MS } from '$lib/server/auth/lucia';
import { hashPassword } from '$lib/server/auth/passwords';
import { personOfCookie } from '$lib/server/auth/sign-ins';
import type { Context } from '$lib/server/context';
import { db } from '$lib/server/db';
import { audit, signInFailures, signIns, users } from '$lib/server/db/schema';
import { listen, type LoggedEvent } from '$lib/server/live/hub';
import { Jar } from '../support/cookies';
import { freshDatabase } from '../support/database';
import { testEnvironment } from '../support/environment';
import { HOSPITAL_NOW, addPerson, contextOf, makeHospital } from '../support/hospital';

const HOUR = 60 * 60 * 1000;
const PASSWORD = 'seven grey herons stand';
const ADDRESS = '203.0.113.7';

let cleanUp: () => void;
const ids: Record<string, string> = {};

beforeAll(async () => {
	const environment = testEnvironment();
	const database = await freshDatabase();
	const { units } = await makeHospital();
	const passwordHash = await hashPassword(PASSWORD);
	for (const [name, disabledAt] of [['una'], ['bela'], ['gone', 1]] as const) {
		const email = `${name}@saltmarsh.example`;
		const { id } = await addPerson({ role: 'nurse', unitIds: [units.ward], email, disabledAt });
		await db().update(users).set({ passwordHash }).where(eq(users.id, id));
		ids[name] = id;
	}
	const invited = await addPerson({
		role: 'nurse',
		unitIds: [],
		email: 'invited@saltmarsh.example'
	});
	ids.invited = invited.id;
	cleanUp = () => {
		database.close();
		environment.remove();
	};
});
afterAll(() => cleanUp());

// The library behind sign-ins reads the time itself; here it reads ours.
beforeEach(() => vi.useFakeTimers({ toFake: ['Date'], now: HOSPITAL_NOW }));
afterEach(async () => {
	vi.useRealTimers();
	await db().delete(signInFailures);
});

function at(now: number, address: string | null = ADDRESS): Context {
	return { actor: null, now, address, key: null };
}

async function attempt(
	email: string,
	password: string,
	now = HOSPITAL_NOW,
	address: string | null = ADDRESS
) {
	const jar = Jar.empty();
	const input = { email: `${email}@saltmarsh.example`, password };
	try {
		return { user: await signIn(at(now, address), jar, input), jar, refused: null };
	} catch (error) {
		if (!(error instanceof Problem)) {
			throw error;
		}
		return { user: null, jar, refused: error };
	}
}

async function newestAudit() {
	const [row] = await db().select().from(audit).orderBy(desc(audit.seq)).limit(1);
	return row;
}

describe('signing in', () => {
	it('gives the browser a token of which the database keeps only a digest', async () => {
		const { user, jar } = await attempt('una', PASSWORD);
		expect(user).toMatchObject({ id: ids.una, role: 'nurse', units: [{ name: 'Tern Ward' }] });
		const token = jar.get('ropewalk') ?? '';
		expect(token.length).toBeGreaterThanOrEqual(22);
		const rows = await db().select().from(signIns);
		expect(JSON.stringify(rows)).not.toContain(token);
		expect((await personOfCookie(jar))?.person.id).toBe(ids.una);
		expect(await newestAudit()).toMatchObject({
			action: 'account.signed-in',
			objectId: ids.una,
			outcome: 'done'
		});
	});

	it('stands with its line on record, or not at all', async () => {
		await db().run(sql`create trigger no_line before insert on audit when new.action = 'account.signed-in'
			begin select raise(abort, 'no room'); end`);
		const before = await db().$count(signIns);
		const jar = Jar.empty();
		const input = { email: 'una@saltmarsh.example', password: PASSWORD };
		await expect(signIn(at(HOSPITAL_NOW), jar, input)).rejects.toThrow();
		await db().run(sql`drop trigger no_line`);
		expect([await db().$count(signIns), jar.getAll()]).toEqual([before, []]);
	});

	it('makes a new token each time and ends the one before', async () => {
		const jar = Jar.empty();
		const input = { email: 'una@saltmarsh.example', password: PASSWORD };
		await signIn(at(HOSPITAL_NOW), jar, input);
		const before = Jar.empty();
		before.set('ropewalk', jar.get('ropewalk') ?? '');
		await signIn(at(HOSPITAL_NOW), jar, input);
		expect(jar.get('ropewalk')).not.toBe(before.get('ropewalk'));
		expect(await personOfCookie(before)).toBeNull();
		expect((await personOfCookie(jar))?.person.id).toBe(ids.una);
	});

	it('in a browser where somebody else sat tells their streams, and nobody’s where nobody did', async () => {
		const heard: LoggedEvent[] = [];
		const stop = listen((event) => heard.push(event));
		const { jar } = await attempt('una', PASSWORD);
		expect(heard).toEqual([]);
		await signIn(at(HOSPITAL_NOW), jar, { email: 'bela@saltmarsh.example', password: PASSWORD });
		stop();
		expect(heard).toMatchObject([{ topic: 'account', kind: 'signed-out', userId: ids.una, episodeId: null }]);
	});

	it.each([
		['nobody of that address', 'nobody', PASSWORD],
		['a wrong password', 'una', 'eight grey herons stand'],
		['a disabled account with the right password', 'gone', PASSWORD],
		['an invitation that was not used', 'invited', PASSWORD]
	])('answers %s the same', async (_, name, password) => {
		const { refused, jar } = await attempt(name, password);
		expect(refused).toMatchObject({ code: 'sign-in-failed', status: 401, extra: {} });
		expect(refused?.detail).toBe('E-mail address or password is wrong');
		expect(jar.getAll()).toEqual([]);
		expect(await newestAudit()).toMatchObject({ action: 'account.sign-in-failed', outcome: 'refused' });
	});

	it('ends after a shift, however busy it was', async () => {
		const { jar } = await attempt('una', PASSWORD);
		vi.setSystemTime(HOSPITAL_NOW + SIGN_IN_MS - 1);
		expect((await personOfCookie(jar))?.person.id).toBe(ids.una);
		vi.setSystemTime(HOSPITAL_NOW + SIGN_IN_MS);
		expect(await personOfCookie(jar)).toBeNull();
	});
});

describe('guessing', () => {
	async function fail(times: number, now = HOSPITAL_NOW, name = 'una') {
		for (let n = 0; n < times; n += 1) {
			expect((await attempt(name, 'a guess', now)).refused?.code).toBe('sign-in-failed');
		}
	}

	it.each([
		[4, 0],
		[5, 1_000]
	])('costs after %i failures a wait of %i ms, for the right password too', async (times, wait) => {
		await fail(times);
		if (wait > 0) {
			const { refused } = await attempt('una', PASSWORD, HOSPITAL_NOW + wait - 1);
			expect(refused).toMatchObject({ code: 'too-many', status: 429, extra: { retryAfterSeconds: 1 } });
		}
		expect((await attempt('una', PASSWORD, HOSPITAL_NOW + wait)).user?.id).toBe(ids.una);
	});

	it('costs twice as long with each further failure, and is forgotten once the right password came', async () => {
		await fail(5);
		await fail(1, HOSPITAL_NOW + 1_000);
		await fail(1, HOSPITAL_NOW + 3_000);
		const { refused } = await attempt('una', PASSWORD, HOSPITAL_NOW + 3_001);
		expect(refused?.extra.retryAfterSeconds).toBe(4);
		const later = HOSPITAL_NOW + 7_000;
		expect((await attempt('una', PASSWORD, later)).user?.id).toBe(ids.una);
		await fail(4, later);
		expect((await attempt('una', PASSWORD, later)).user?.id).toBe(ids.una);
	});

	it('with many tries at once gets no further than one after the other', async () => {
		const many = await Promise.all(Array.from({ length: 30 }, () => attempt('una', 'a guess')));
		const codes = many.map(({ refused }) => refused?.code);
		expect(codes.filter((code) => code === 'sign-in-failed')).toHaveLength(5);
		expect(codes.filter((code) => code === 'too-many')).toHaveLength(25);
	});

	it('costs nobody anything while everybody is right, and leaves no count behind', async () => {
		const one = await Promise.all(Array.from({ length: 4 }, () => attempt('una', PASSWORD)));
		const other = await Promise.all(Array.from({ length: 4 }, () => attempt('bela', PASSWORD)));
		expect([...one, ...other].filter(({ refused }) => refused !== null)).toEqual([]);
		const counts = await db().select({ count: signInFailures.count }).from(signInFailures);
		expect(counts).toEqual([{ count: 0 }]);
	});

	it('cannot be hidden from its address by signing in between', async () => {
		for (let n = 0; n < 20; n += 1) {
			await attempt(`nobody${n}`, 'a guess');
		}
		expect((await attempt('bela', PASSWORD, HOSPITAL_NOW + 1_000)).user?.id).toBe(ids.bela);
		await attempt('nobody20', 'a guess', HOSPITAL_NOW + 1_000);
		const { refused } = await attempt('bela', PASSWORD, HOSPITAL_NOW + 1_001);
		expect(refused?.extra.retryAfterSeconds).toBe(2);
	});

	it('says nothing about whether the account exists', async () => {
		await fail(5, HOSPITAL_NOW, 'nobody');
		expect((await attempt('nobody', 'a guess')).refused?.code).toBe('too-many');
	});

	it('does not lock others out until their address has failed twenty times', async () => {
		for (let n = 0; n < 19; n += 1) {
			await attempt(`nobody${n}`, 'a guess');
		}
		expect((await attempt('bela', PASSWORD)).user?.id).toBe(ids.bela);
		await attempt('nobody19', 'a guess');
		expect((await attempt('bela', PASSWORD)).refused?.code).toBe('too-many');
		expect((await attempt('bela', PASSWORD, HOSPITAL_NOW, '203.0.113.8')).user?.id).toBe(ids.bela);
	});
});

describe('signing out', () => {
	it('ends this sign-in alone, and tells the other tabs', async () => {
		const { jar } = await attempt('una', PASSWORD);
		const { jar: phone } = await attempt('una', PASSWORD);
		const person = (await personOfCookie(jar))?.person;
		const heard: LoggedEvent[] = [];
		const stop = listen((event) => heard.push(event));
		const copy = Jar.empty();
		copy.set('ropewalk', jar.get('ropewalk') ?? '');
		await signOut(person ? contextOf(person) : at(HOSPITAL_NOW), jar);
		stop();
		expect(jar.getAll()).toEqual([]);
		expect(await personOfCookie(copy)).toBeNull();
		expect((await personOfCookie(phone))?.person.id).toBe(ids.una);
		expect(heard).toMatchObject([{ topic: 'account', kind: 'signed-out', userId: ids.una, episodeId: null }]);
		expect(await newestAudit()).toMatchObject({ action: 'account.signed-out', actorId: ids.una });
	});

	it('is harmless without a sign-in', async () => {
		const before = await db().$count(audit);
		await signOut(at(HOSPITAL_NOW), Jar.empty());
		expect(await db().$count(audit)).toBe(before);
	});
});

describe('a shift that is over', () => {
	/** Una signs in twice and Bela once, an hour later; nobody else has a sign-in. */
	async function threeSignIns(): Promise<void> {
		await db().delete(signIns);
		await attempt('una', PASSWORD);
		await attempt('una', PASSWORD);
		await attempt('bela', PASSWORD, HOSPITAL_NOW + HOUR);
	}
	const ends = () => db().select().from(audit).where(eq(audit.action, 'account.sign-ins-ended'));

	it.each([
		['an instant before', SIGN_IN_MS - 1, [], 3],
		['at its end', SIGN_IN_MS, [['una', 2]], 1],
		['an instant before the later one', SIGN_IN_MS + HOUR - 1, [['una', 2]], 1],
		[
			'when both are over',
			SIGN_IN_MS + HOUR,
			[
				['una', 2],
				['bela', 1]
			],
			0
		]
	] as const)('%s ends what it must, with a line for each account', async (_, after, ended, left) => {
		await threeSignIns();
		const before = (await ends()).length;
		expect(await endSignInsOver(HOSPITAL_NOW + after)).toBe(ended.length);
		expect(await db().$count(signIns)).toBe(left);
		const lines = (await ends()).slice(before).map(({ actorKind, actorId, objectId, detail }) => {
			return { actorKind, actorId, objectId, detail };
		});
		expect(lines).toEqual(
			expect.arrayContaining(
				ended.map(([name, count]) => ({
					actorKind: 'system',
					actorId: 'sign-ins',
					objectId: ids[name],
					detail: { by: 'shift-over', count }
				}))
			)
		);
		expect(lines).toHaveLength(ended.length);
	});

	it('is put on record once, though its cookie is shown again and again', async () => {
		await db().delete(signIns);
		const { jar } = await attempt('una', PASSWORD);
		vi.setSystemTime(HOSPITAL_NOW + 2 * SIGN_IN_MS);
		const before = (await ends()).length;
		expect([await personOfCookie(jar), await personOfCookie(jar)]).toEqual([null, null]);
		expect(await db().$count(signIns)).toBe(1);
		expect(await endSignInsOver(HOSPITAL_NOW + 2 * SIGN_IN_MS)).toBe(1);
		expect(await endSignInsOver(HOSPITAL_NOW + 2 * SIGN_IN_MS)).toBe(0);
		expect(await ends()).toHaveLength(before + 1);
	});
});
