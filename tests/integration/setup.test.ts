import { eq } from 'drizzle-orm';
import { afterAll, afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { becomeFirstAdmin, lookAtInvitation } from '$lib/server/accounts/invitations';
import { passwordFits } from '$lib/server/auth/passwords';
import type { Context } from '$lib/server/context';
import { db, transact } from '$lib/server/db';
import { invitations, settings, users } from '$lib/server/db/schema';
import { prepareHospital } from '$lib/server/setup';
import { FIRST_ADMIN_LIFE_MS, inviteFirstAdmin } from '$lib/server/setup/first-admin';
import { kindOfDatabase, markLoaded, markLoading } from '$lib/server/setup/mark';
import { freshDatabase } from '../support/database';
import { testEnvironment } from '../support/environment';
import { HOSPITAL_NOW, makeHospital } from '../support/hospital';

const { remove } = testEnvironment({ DEMO: '', PUBLIC_URL: 'https://ropewalk.saltmarsh.example/' });
const PASSWORD = 'seven grey herons stand';

let close: () => void;
beforeEach(async () => {
	({ close } = await freshDatabase());
});
afterEach(() => {
	vi.restoreAllMocks();
	close();
});
afterAll(() => remove());

const anybody = (now = HOSPITAL_NOW): Context => ({ actor: null, now, address: null, key: null });
const tokenOf = (link: string | null) => link?.split('/').at(-1) ?? '';
const who = { name: 'Lorcan Whitby', email: 'lorcan@saltmarsh.example', password: PASSWORD };

/** Start as a hospital's own server and give back what was printed. */
async function started(): Promise<string> {
	let printed = '';
	vi.spyOn(process.stdout, 'write').mockImplementation((text) => {
		printed += String(text);
		return true;
	});
	await prepareHospital();
	vi.restoreAllMocks();
	return printed;
}

describe('the first start', () => {
	it('prints one link for the first administrator and stores only its digest', async () => {
		const printed = await started();
		const links = printed.match(/https:\/\/ropewalk\.saltmarsh\.example\/invite\/[\w-]{43}\n/g) ?? [];
		expect(links).toHaveLength(1);
		const rows = await db().select().from(invitations);
		expect(rows).toHaveLength(1);
		expect(JSON.stringify(rows)).not.toContain(tokenOf(links[0]?.trim() ?? null));
		expect(await db().$count(users)).toBe(0);
	});

	it('of several makes the newest link count', async () => {
		const first = tokenOf(await inviteFirstAdmin(HOSPITAL_NOW));
		const second = tokenOf(await inviteFirstAdmin(HOSPITAL_NOW + 1));
		expect(await lookAtInvitation(first, HOSPITAL_NOW + 1)).toEqual({ state: 'expired' });
		expect(await lookAtInvitation(second, HOSPITAL_NOW + 1)).toEqual({ state: 'open', kind: 'first-admin' });
	});

	it('prints nothing when there is somebody', async () => {
		await makeHospital();
		expect(await started()).toBe('');
		expect(await db().$count(invitations)).toBe(0);
	});
});

describe('the first administrator', () => {
	it('makes their own account, once', async () => {
		const token = tokenOf(await inviteFirstAdmin(HOSPITAL_NOW));
		const id = await becomeFirstAdmin(anybody(), token, who);
		const [user] = await db().select().from(users).where(eq(users.id, id));
		expect(user).toMatchObject({ role: 'admin', email: who.email, name: who.name });
		expect(await passwordFits(user?.passwordHash ?? null, PASSWORD)).toBe(true);
		const again = becomeFirstAdmin(anybody(), token, { ...who, email: 'other@saltmarsh.example' });
		await expect(again).rejects.toMatchObject({ code: 'not-found' });
		expect(await db().$count(users)).toBe(1);
		expect(await inviteFirstAdmin(HOSPITAL_NOW)).toBeNull();
	});

	it('is one of two who open the link at once', async () => {
		const token = tokenOf(await inviteFirstAdmin(HOSPITAL_NOW));
		const both = await Promise.allSettled([
			becomeFirstAdmin(anybody(), token, who),
			becomeFirstAdmin(anybody(), token, { ...who, email: 'other@saltmarsh.example' })
		]);
		expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
		expect(await db().$count(users)).toBe(1);
	});

	it.each([
		[FIRST_ADMIN_LIFE_MS - 1, 'open'],
		[FIRST_ADMIN_LIFE_MS, 'expired']
	])('has %i ms later a link that is %s', async (later, state) => {
		const token = tokenOf(await inviteFirstAdmin(HOSPITAL_NOW));
		const now = HOSPITAL_NOW + later;
		expect((await lookAtInvitation(token, now)).state).toBe(state);
		const becoming = becomeFirstAdmin(anybody(now), token, who);
		await (state === 'open'
			? expect(becoming).resolves.toEqual(expect.any(String))
			: expect(becoming).rejects.toMatchObject({ code: 'not-found' }));
	});

	it('comes too late when somebody has an account already', async () => {
		const token = tokenOf(await inviteFirstAdmin(HOSPITAL_NOW));
		await makeHospital();
		expect((await lookAtInvitation(token, HOSPITAL_NOW)).state).toBe('used');
		await expect(becomeFirstAdmin(anybody(), token, who)).rejects.toMatchObject({ code: 'not-found' });
	});
});

describe('a database', () => {
	it('is fresh until something was done in it, and somebody’s own from then on', async () => {
		expect(await kindOfDatabase()).toBe('fresh');
		await inviteFirstAdmin(HOSPITAL_NOW);
		expect(await kindOfDatabase()).toBe('own');
	});

	it.each([
		['complete', true],
		['unfinished', false]
	])('that is a demonstration, %s, is not opened as a hospital’s own', async (_, complete) => {
		await transact((tx) => markLoading(tx, HOSPITAL_NOW));
		if (complete) {
			await transact((tx) => markLoaded(tx, HOSPITAL_NOW));
		}
		await expect(prepareHospital()).rejects.toThrow(/is a demonstration with known passwords/);
		expect(await db().$count(invitations)).toBe(0);
		expect(await db().$count(settings)).toBe(1);
	});
});
