import { desc, eq } from 'drizzle-orm';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Person } from '$lib/domain/access/actor';
import { changePassword, makeToken, revokeToken, tokensOf } from '$lib/server/accounts/own';
import { digestSecret } from '$lib/server/auth/lucia';
import { hashPassword, passwordFits } from '$lib/server/auth/passwords';
import { personOfToken } from '$lib/server/auth/people';
import { personOfCookie } from '$lib/server/auth/sign-ins';
import { db } from '$lib/server/db';
import { audit, idempotencyKeys, personalTokens, signInFailures, users } from '$lib/server/db/schema';
import { signedIn } from '../support/cookies';
import { freshDatabase } from '../support/database';
import { testEnvironment } from '../support/environment';
import { HOSPITAL_NOW, addPerson, contextOf } from '../support/hospital';

const PASSWORD = 'seven grey herons stand';
const NEXT = 'eight white egrets fly';

let cleanUp: () => void;
let person: Person;

beforeAll(async () => {
	const environment = testEnvironment();
	const database = await freshDatabase();
	cleanUp = () => {
		database.close();
		environment.remove();
	};
});
afterAll(() => cleanUp());
beforeEach(async () => {
	vi.useFakeTimers({ toFake: ['Date'], now: HOSPITAL_NOW });
	await db().delete(signInFailures);
	person = await addPerson({ role: 'nurse', unitIds: [] });
	const passwordHash = await hashPassword(PASSWORD);
	await db().update(users).set({ passwordHash }).where(eq(users.id, person.id));
});
afterEach(() => vi.useRealTimers());

async function fits(password: string): Promise<boolean> {
	const [user] = await db().select().from(users).where(eq(users.id, person.id));
	return passwordFits(user?.passwordHash ?? null, password);
}

async function here() {
	const jar = await signedIn(person.id, HOSPITAL_NOW);
	return { jar, id: digestSecret(jar.get('ropewalk') ?? '') };
}

describe('changing the password', () => {
	it('ends every other sign-in and keeps this one', async () => {
		const [desk, phone] = [await here(), await here()];
		await changePassword(contextOf(person), desk.id, { current: PASSWORD, next: NEXT });
		expect([await fits(PASSWORD), await fits(NEXT)]).toEqual([false, true]);
		expect((await personOfCookie(desk.jar))?.person.id).toBe(person.id);
		expect(await personOfCookie(phone.jar)).toBeNull();
	});

	it('ends every token, and each is on record', async () => {
		const [first, second] = [
			(await makeToken(contextOf(person), { name: 'ward clock' })) ?? '',
			(await makeToken(contextOf(person), { name: 'day list' })) ?? ''
		];
		const ids = (await tokensOf(contextOf(person))).map(({ id }) => id);
		await changePassword(contextOf(person), null, { current: PASSWORD, next: NEXT });
		expect([await personOfToken(first), await personOfToken(second)]).toEqual([null, null]);
		const rows = await db().select().from(audit).orderBy(desc(audit.seq)).limit(2);
		expect(rows.map(({ action }) => action)).toEqual(['account.token-revoked', 'account.token-revoked']);
		expect(rows.map(({ objectId }) => objectId).toSorted()).toEqual(ids.toSorted());
	});

	it('asks for the current one', async () => {
		const { jar, id } = await here();
		const refused = changePassword(contextOf(person), id, { current: 'not it', next: NEXT });
		await expect(refused).rejects.toMatchObject({
			code: 'invalid',
			extra: { errors: [{ pointer: '/current' }] }
		});
		expect(await fits(PASSWORD)).toBe(true);
		expect((await personOfCookie(jar))?.person.id).toBe(person.id);
	});

	it('slows down guessing as signing in does', async () => {
		const change = (current: string, now = HOSPITAL_NOW) =>
			changePassword(contextOf(person, now), null, { current, next: NEXT });
		for (let n = 0; n < 5; n += 1) {
			await expect(change('not it')).rejects.toMatchObject({ code: 'invalid' });
		}
		await expect(change(PASSWORD, HOSPITAL_NOW + 999)).rejects.toMatchObject({ code: 'too-many' });
		await change(PASSWORD, HOSPITAL_NOW + 1_000);
		expect(await fits(NEXT)).toBe(true);
	});
});

describe('a token for a program', () => {
	it('is shown once and kept as a digest', async () => {
		const context = contextOf(person);
		const token = (await makeToken(context, { name: 'ward clock' })) ?? '';
		expect((await personOfToken(token))?.id).toBe(person.id);
		const [row] = await tokensOf(context);
		expect(row).toEqual({ id: expect.any(String), name: 'ward clock', createdAt: HOSPITAL_NOW });
		expect(JSON.stringify(await db().select().from(personalTokens))).not.toContain(token);
	});

	it('is made once by a form sent twice, and not told again', async () => {
		const key = { key: 'k1', path: '/account?/token', digest: 'd' };
		const first = await makeToken({ ...contextOf(person), key }, { name: 'ward clock' });
		const again = await makeToken({ ...contextOf(person), key }, { name: 'ward clock' });
		expect(first).toMatch(/^ropewalk_[\w-]{43}$/);
		expect(again).toBeNull();
		expect(await tokensOf(contextOf(person))).toHaveLength(1);
		expect(JSON.stringify(await db().select().from(idempotencyKeys))).not.toContain(first);
	});

	it('works until it is revoked, once, by its owner', async () => {
		const context = contextOf(person);
		const token = (await makeToken(context, { name: 'ward clock' })) ?? '';
		const [row] = await tokensOf(context);
		const id = row?.id ?? '';
		const stranger = await addPerson({ role: 'admin', unitIds: [] });
		await expect(revokeToken(contextOf(stranger), id)).rejects.toMatchObject({ code: 'not-found' });
		expect((await personOfToken(token))?.id).toBe(person.id);
		await revokeToken(context, id);
		expect(await personOfToken(token)).toBeNull();
		expect(await tokensOf(context)).toEqual([]);
		await expect(revokeToken(context, id)).rejects.toMatchObject({ code: 'not-found' });
	});
});
