import { and, desc, eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { becomeFirstAdmin, lookAtInvitation, takeUpInvitation } from '$lib/server/accounts/invitations';
import { INVITATION_LIFE_MS } from '$lib/server/accounts/invite';
import { createAccount, disableAccount, inviteAgain } from '$lib/server/accounts/manage';
import { makeToken } from '$lib/server/accounts/own';
import { passwordFits } from '$lib/server/auth/passwords';
import { loadPerson, personOfToken } from '$lib/server/auth/people';
import type { Context } from '$lib/server/context';
import { db } from '$lib/server/db';
import { audit, invitations, outbox, signIns, users } from '$lib/server/db/schema';
import { linkToken } from '$lib/server/links';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { ScriptedChannel } from '../support/channels';
import { HOSPITAL_NOW, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const PASSWORD = 'seven grey herons stand';
const END = HOSPITAL_NOW + INVITATION_LIFE_MS;

const hospital = await openHospital({ PORT: '4451' });
let mail: ScriptedChannel;

beforeEach(async () => {
	mail = new ScriptedChannel();
	await db().update(outbox).set({ state: 'cancelled' });
});

const admin = (now = HOSPITAL_NOW) => contextOf(hospital.people.admin, now);
const anybody = (now = HOSPITAL_NOW): Context => ({ actor: null, now, address: '203.0.113.7', key: null });

let count = 0;
/** Invite somebody and give back what only their mail tells. */
async function invited(): Promise<{ id: string; email: string; token: string }> {
	count += 1;
	const email = `new${count}@saltmarsh.example`;
	const { result } = await createAccount(admin(), {
		name: `Una Fairlead ${count}`,
		email,
		role: 'nurse',
		units: [hospital.units.ward]
	});
	return { id: result.id, email, token: await newestToken(result.id) };
}

async function newestToken(userId: string): Promise<string> {
	const [row] = await db()
		.select()
		.from(invitations)
		.where(eq(invitations.userId, userId))
		.orderBy(desc(invitations.createdAt), desc(invitations.id))
		.limit(1);
	return linkToken(row?.id ?? '');
}

async function send(now: number): Promise<void> {
	await new OutboxWorker({ channels: { sms: null, mail }, now: () => now }).settle();
}

async function userById(id: string) {
	const [user] = await db().select().from(users).where(eq(users.id, id));
	return user;
}

describe('an invitation', () => {
	it('travels by mail, and neither outbox nor table opens it', async () => {
		const { id, email, token } = await invited();
		const [row] = await db().select().from(outbox).where(eq(outbox.refId, id));
		const [stored] = await db().select().from(invitations).where(eq(invitations.userId, id));
		expect(row).toMatchObject({ channel: 'mail', kind: 'mail', refKind: 'account', expiresAt: END });
		expect(JSON.stringify([row, stored])).not.toContain(token);
		await send(HOSPITAL_NOW);
		expect(mail.sent).toHaveLength(1);
		expect(mail.sent[0]).toMatchObject({ to: email });
		expect(mail.sent[0]?.body).toContain(`http://127.0.0.1:4451/invite/${token}\n`);
	});

	it('sets the password once', async () => {
		const { id, email, token } = await invited();
		const open = await lookAtInvitation(token, HOSPITAL_NOW);
		expect(open).toMatchObject({ state: 'open', kind: 'account', email });
		expect(await takeUpInvitation(anybody(), token, PASSWORD)).toBe(id);
		expect(await passwordFits((await userById(id))?.passwordHash ?? null, PASSWORD)).toBe(true);
		expect(await lookAtInvitation(token, HOSPITAL_NOW)).toEqual({ state: 'used' });
		await expect(takeUpInvitation(anybody(), token, 'another long password')).rejects.toMatchObject({
			code: 'not-found'
		});
		expect(await passwordFits((await userById(id))?.passwordHash ?? null, PASSWORD)).toBe(true);
	});

	it('is on record as the deed of its owner', async () => {
		const { id, token } = await invited();
		await takeUpInvitation(anybody(), token, PASSWORD);
		const [row] = await db().select().from(audit).orderBy(desc(audit.seq)).limit(1);
		expect(row).toMatchObject({
			action: 'account.password-set',
			actorKind: 'person',
			actorId: id,
			objectId: id,
			address: '203.0.113.7',
			detail: { by: 'invitation' }
		});
	});

	it('lets one of two through who use it at once', async () => {
		const { token } = await invited();
		const both = await Promise.allSettled([
			takeUpInvitation(anybody(), token, PASSWORD),
			takeUpInvitation(anybody(), token, 'eight white egrets fly')
		]);
		expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
	});

	it.each([
		[END - 1, 'open'],
		[END, 'expired'],
		[END + 1, 'expired']
	])('at %i is %s', async (now, state) => {
		const { token } = await invited();
		expect((await lookAtInvitation(token, now)).state).toBe(state);
		const taking = takeUpInvitation(anybody(now), token, PASSWORD);
		await (state === 'open'
			? expect(taking).resolves.toEqual(expect.any(String))
			: expect(taking).rejects.toMatchObject({ code: 'not-found' }));
	});

	it('of a made-up token is unknown, and its form does nothing', async () => {
		expect(await lookAtInvitation('x'.repeat(22), HOSPITAL_NOW)).toEqual({ state: 'unknown' });
		await expect(takeUpInvitation(anybody(), 'x'.repeat(22), PASSWORD)).rejects.toMatchObject({
			code: 'not-found'
		});
		await expect(
			becomeFirstAdmin(anybody(), 'x'.repeat(22), { name: 'A', email: 'a@b.example', password: PASSWORD })
		).rejects.toMatchObject({ code: 'not-found' });
	});

	it('of an account never makes a first administrator', async () => {
		const { token } = await invited();
		await expect(
			becomeFirstAdmin(anybody(), token, { name: 'A', email: 'a@b.example', password: PASSWORD })
		).rejects.toMatchObject({ code: 'not-found' });
		expect((await lookAtInvitation(token, HOSPITAL_NOW)).state).toBe('open');
	});

	it('ends when a newer one is sent, whose mail alone still goes out', async () => {
		const { id, token } = await invited();
		await inviteAgain(admin(HOSPITAL_NOW + 1), id);
		const newer = await newestToken(id);
		expect(await lookAtInvitation(token, HOSPITAL_NOW + 1)).toEqual({ state: 'used' });
		expect((await lookAtInvitation(newer, HOSPITAL_NOW + 1)).state).toBe('open');
		await send(HOSPITAL_NOW + 1);
		expect(mail.sent.map(({ body }) => body.includes(newer))).toEqual([true]);
		const skipped = await db()
			.select({ reason: outbox.stateReason })
			.from(outbox)
			.where(and(eq(outbox.refId, id), eq(outbox.state, 'skipped')));
		expect(skipped).toEqual([{ reason: 'invitation used' }]);
	});

	it('that could not be sent in time has failed', async () => {
		const { id } = await invited();
		await send(END);
		const [row] = await db().select().from(outbox).where(eq(outbox.refId, id));
		expect(row).toMatchObject({ state: 'failed', stateReason: 'expired' });
		expect(mail.sent).toHaveLength(0);
	});

	it('opens nothing once its account is disabled', async () => {
		const { id, token } = await invited();
		await disableAccount(admin(), id);
		expect((await lookAtInvitation(token, HOSPITAL_NOW)).state).toBe('used');
		await expect(takeUpInvitation(anybody(), token, PASSWORD)).rejects.toMatchObject({ code: 'not-found' });
		await expect(inviteAgain(admin(), id)).rejects.toMatchObject({ code: 'wrong-state' });
	});

	it('for a forgotten password ends the sign-ins and tokens of before', async () => {
		const { id, token } = await invited();
		await takeUpInvitation(anybody(), token, PASSWORD);
		await db()
			.insert(signIns)
			.values({ id: `sign-in-${id}`, userId: id, expiresAt: END / 1000, createdAt: HOSPITAL_NOW });
		const person = await loadPerson(db(), id);
		const program = (person && (await makeToken(contextOf(person), { name: 'ward clock' }))) ?? '';
		expect((await personOfToken(program))?.id).toBe(id);
		await inviteAgain(admin(), id);
		await takeUpInvitation(anybody(), await newestToken(id), 'eight white egrets fly');
		expect(await personOfToken(program)).toBeNull();
		expect(await db().$count(signIns, eq(signIns.userId, id))).toBe(0);
		const { passwordHash = null } = (await userById(id)) ?? {};
		expect(await passwordFits(passwordHash, PASSWORD)).toBe(false);
		expect(await passwordFits(passwordHash, 'eight white egrets fly')).toBe(true);
	});
});
