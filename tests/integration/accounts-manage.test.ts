import { desc, eq } from 'drizzle-orm';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { ROLES } from '$lib/domain/core/codes';
import { listAccounts } from '$lib/server/accounts/list';
import {
	createAccount,
	createUnit,
	disableAccount,
	enableAccount,
	inviteAgain,
	setUnits
} from '$lib/server/accounts/manage';
import { makeToken, revokeToken, tokensOf } from '$lib/server/accounts/own';
import { loadPerson, personOfToken } from '$lib/server/auth/people';
import { personOfCookie, signInStillGood } from '$lib/server/auth/sign-ins';
import { digestSecret } from '$lib/server/auth/lucia';
import type { PersonContext } from '$lib/server/context';
import { db } from '$lib/server/db';
import { audit, outbox, signIns, units, users } from '$lib/server/db/schema';
import { listen, type LoggedEvent } from '$lib/server/live/hub';
import { openStream, openStreams } from '$lib/server/live/stream';
import { signedIn } from '../support/cookies';
import { HOSPITAL_NOW, addPerson, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital({});

afterEach(() => vi.useRealTimers());

const admin = () => contextOf(hospital.people.admin);
const nurse = () => addPerson({ role: 'nurse', unitIds: [hospital.units.ward] });
const account = (email: string, more: object = {}) => ({
	name: 'Una Fairlead',
	email,
	role: 'nurse' as const,
	units: [hospital.units.ward],
	...more
});

async function heardWhile(work: () => Promise<unknown>): Promise<LoggedEvent[]> {
	const heard: LoggedEvent[] = [];
	const stop = listen((event) => heard.push(event));
	await work();
	stop();
	return heard;
}

async function auditOf(objectId: string) {
	const rows = await db().select().from(audit).where(eq(audit.objectId, objectId)).orderBy(desc(audit.seq));
	return rows.map(({ action }) => action);
}

const newestAudit = (count: number) => db().select().from(audit).orderBy(desc(audit.seq)).limit(count);

describe('managing accounts', () => {
	const deeds: [string, (context: PersonContext) => Promise<unknown>][] = [
		['list accounts', (as) => listAccounts(as)],
		['make an account', (as) => createAccount(as, account('forbidden@saltmarsh.example'))],
		['invite again', (as) => inviteAgain(as, hospital.nurse2.id)],
		['disable an account', (as) => disableAccount(as, hospital.nurse2.id)],
		['enable an account', (as) => enableAccount(as, hospital.nurse2.id)],
		['set units', (as) => setUnits(as, hospital.nurse2.id, [])],
		['make a unit', (as) => createUnit(as, { name: 'Forbidden Ward', kind: 'ward' })]
	];
	const others = ROLES.filter((role) => role !== 'admin');

	it.each(deeds)('only an administrator may %s', async (_, deed) => {
		for (const role of others) {
			const refused = Promise.resolve().then(() => deed(contextOf(hospital.people[role])));
			await expect(refused, role).rejects.toMatchObject({ code: 'not-allowed' });
		}
		expect(await loadPerson(db(), hospital.nurse2.id)).toMatchObject({ unitIds: expect.any(Array) });
		expect(await db().$count(users, eq(users.email, 'forbidden@saltmarsh.example'))).toBe(0);
		expect(await db().$count(units, eq(units.name, 'Forbidden Ward'))).toBe(0);
	});

	it('makes an account that is on record and belongs to its units', async () => {
		const { result } = await createAccount(
			admin(),
			account('una@saltmarsh.example', { phone: '086 123 4567' })
		);
		const [user] = await db().select().from(users).where(eq(users.id, result.id));
		expect(user).toMatchObject({ phone: '+353861234567', passwordHash: null, disabledAt: null });
		expect((await loadPerson(db(), result.id))?.unitIds).toEqual([hospital.units.ward]);
		expect(await auditOf(result.id)).toEqual(['account.invited', 'account.created']);
		const { accounts } = await listAccounts(admin());
		expect(accounts.find(({ id }) => id === result.id)).toMatchObject({
			hasPassword: false,
			invitation: { mail: 'ready' }
		});
		expect(JSON.stringify(accounts)).not.toContain('passwordHash');
	});

	it('does one form sent twice once', async () => {
		const key = { key: 'k1', path: '/admin/accounts?/account', digest: 'd' };
		const first = await createAccount({ ...admin(), key }, account('twice@saltmarsh.example'));
		const again = await createAccount({ ...admin(), key }, account('twice@saltmarsh.example'));
		expect(again).toEqual({ result: first.result, replayed: true });
		expect(await db().$count(outbox, eq(outbox.refId, first.result.id))).toBe(1);
	});

	it.each([
		['an address in use', { email: 'una@saltmarsh.example' }, '/email'],
		['a unit that is none', { units: ['nowhere'] }, '/units'],
		['a nurse without a unit', { units: [] }, '/units'],
		['a coordinator without a unit', { role: 'coordinator', units: [] }, '/units'],
		['a telephone number that is none', { phone: 'ring the ward' }, '/phone']
	])('refuses %s and writes nothing', async (_, more, pointer) => {
		const before = await db().$count(users);
		const refused = createAccount(admin(), account('refused@saltmarsh.example', more));
		await expect(refused).rejects.toMatchObject({ code: 'invalid', extra: { errors: [{ pointer }] } });
		expect(await db().$count(users)).toBe(before);
	});

	it('asks no unit of an administrator, who sees no patients', async () => {
		const made = await createAccount(
			admin(),
			account('head@saltmarsh.example', { role: 'admin', units: [] })
		);
		expect((await loadPerson(db(), made.result.id))?.unitIds).toEqual([]);
	});

	it('takes the last unit from nobody who sees patients', async () => {
		const person = await nurse();
		await expect(setUnits(admin(), person.id, [])).rejects.toMatchObject({
			code: 'invalid',
			extra: { errors: [{ pointer: '/units' }] }
		});
		expect((await loadPerson(db(), person.id))?.unitIds).toEqual([hospital.units.ward]);
	});

	it('says from now on which units somebody belongs to', async () => {
		const person = await nurse();
		const { icu, gym } = hospital.units;
		const heard = await heardWhile(() => setUnits(admin(), person.id, [icu, gym, icu]));
		expect([...((await loadPerson(db(), person.id))?.unitIds ?? [])].sort()).toEqual([icu, gym].sort());
		expect(heard).toMatchObject([{ topic: 'account', kind: 'units-set', userId: person.id }]);
		await expect(setUnits(admin(), person.id, ['nowhere'])).rejects.toMatchObject({ code: 'invalid' });
		await expect(setUnits(admin(), 'nobody', [])).rejects.toMatchObject({ code: 'not-found' });
		expect((await loadPerson(db(), person.id))?.unitIds).toHaveLength(2);
	});

	it('makes a unit once for each name', async () => {
		const { result } = await createUnit(admin(), { name: 'Plover Ward', kind: 'ward' });
		const [unit] = await db().select().from(units).where(eq(units.id, result.id));
		expect(unit).toMatchObject({ name: 'Plover Ward', kind: 'ward', zone: 'Europe/Dublin' });
		const again = createUnit(admin(), { name: 'Plover Ward', kind: 'gym' });
		await expect(again).rejects.toMatchObject({ extra: { errors: [{ pointer: '/name' }] } });
	});
});

describe('disabling an account', () => {
	it('ends its sign-ins and tokens at once, and tells its streams', async () => {
		vi.useFakeTimers({ toFake: ['Date'], now: HOSPITAL_NOW });
		const person = await nurse();
		const [desk, phone] = [await signedIn(person.id, HOSPITAL_NOW), await signedIn(person.id, HOSPITAL_NOW)];
		const token = (await makeToken(contextOf(person), { name: 'ward clock' })) ?? '';
		expect((await personOfCookie(desk))?.person.id).toBe(person.id);
		expect((await personOfToken(token))?.id).toBe(person.id);

		const heard = await heardWhile(() => disableAccount(admin(), person.id));

		expect(await personOfCookie(desk)).toBeNull();
		expect(await personOfCookie(phone)).toBeNull();
		expect(await personOfToken(token)).toBeNull();
		expect(await db().$count(signIns, eq(signIns.userId, person.id))).toBe(0);
		expect(heard).toMatchObject([{ topic: 'account', kind: 'disabled', userId: person.id }]);
		expect(await auditOf(person.id)).toEqual(['account.sign-ins-ended', 'account.disabled']);
		const [ended] = await newestAudit(1);
		expect(ended).toMatchObject({
			action: 'account.token-revoked',
			objectKind: 'token',
			actorId: hospital.people.admin.id,
			detail: { by: 'disabled' }
		});
	});

	it('is final for tokens: enabled again, the account needs new ones', async () => {
		const person = await nurse();
		const token = (await makeToken(contextOf(person), { name: 'ward clock' })) ?? '';
		await disableAccount(admin(), person.id);
		await enableAccount(admin(), person.id);
		expect(await personOfToken(token)).toBeNull();
		expect(await tokensOf(contextOf(person))).toEqual([]);
	});

	it('ends with its taking back a token that outlived a disabling of an older version', async () => {
		const person = await nurse();
		const token = (await makeToken(contextOf(person), { name: 'ward clock' })) ?? '';
		await db().update(users).set({ disabledAt: HOSPITAL_NOW }).where(eq(users.id, person.id));
		await enableAccount(admin(), person.id);
		expect(await personOfToken(token)).toBeNull();
		expect((await newestAudit(1))[0]).toMatchObject({ detail: { by: 'enabled' } });
	});

	it('ends its open stream without waiting for a heartbeat, and no other', async () => {
		vi.useFakeTimers({ toFake: ['Date'], now: HOSPITAL_NOW });
		const [person, other] = [await nurse(), await nurse()];
		const jar = await signedIn(person.id, HOSPITAL_NOW);
		const digest = digestSecret(jar.get('ropewalk') ?? '');
		const own = openStream({
			person,
			stillGood: () => signInStillGood(digest, HOSPITAL_NOW),
			after: null
		}).body?.getReader();
		const others = openStream({
			person: other,
			stillGood: () => Promise.resolve(true),
			after: null
		}).body?.getReader();
		if (!own || !others) {
			throw new Error('A stream has no body.');
		}
		// The first two blocks tell that the stream is open and where it stands.
		await own.read();
		await own.read();
		await disableAccount(admin(), person.id);
		for (let done = false; !done;) {
			({ done } = await own.read());
		}
		expect(openStreams()).toBe(1);
		await others.cancel();
	});

	it('ends the stream of a program whose token is revoked', async () => {
		const person = await nurse();
		const token = (await makeToken(contextOf(person), { name: 'ward clock' })) ?? '';
		const good = async () => (await personOfToken(token)) !== null;
		const stream = openStream({ person, stillGood: good, after: null }).body?.getReader();
		await stream?.read();
		await stream?.read();
		const [row] = await tokensOf(contextOf(person));
		await revokeToken(contextOf(person), row?.id ?? '');
		for (let done = false; !done;) {
			({ done } = (await stream?.read()) ?? { done: true });
		}
		expect(openStreams()).toBe(0);
	});

	it('is refused for oneself, for nobody, and a second time', async () => {
		const person = await nurse();
		await expect(disableAccount(admin(), hospital.people.admin.id)).rejects.toMatchObject({
			code: 'wrong-state'
		});
		await expect(disableAccount(admin(), 'nobody')).rejects.toMatchObject({ code: 'not-found' });
		await disableAccount(admin(), person.id);
		await expect(disableAccount(admin(), person.id)).rejects.toMatchObject({ code: 'wrong-state' });
	});

	it('can be taken back', async () => {
		const person = await nurse();
		await expect(enableAccount(admin(), person.id)).rejects.toMatchObject({ code: 'wrong-state' });
		await disableAccount(admin(), person.id);
		expect(await loadPerson(db(), person.id)).toBeNull();
		await enableAccount(admin(), person.id);
		expect((await loadPerson(db(), person.id))?.unitIds).toEqual([hospital.units.ward]);
		expect(await auditOf(person.id)).toEqual(['account.enabled', 'account.disabled']);
	});
});
