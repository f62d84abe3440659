import { eq, sql } from 'drizzle-orm';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { verifyAudit } from '$lib/server/audit/verify';
import type { PersonContext } from '$lib/server/context';
import { db } from '$lib/server/db';
import { audit, entries, idempotencyKeys, liveEvents, outbox, settings } from '$lib/server/db/schema';
import { listen, type LoggedEvent } from '$lib/server/live/hub';
import { write, type Change } from '$lib/server/write';
import { addReferral, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
let threadId: string;
let context: PersonContext;
let heard: LoggedEvent[];

beforeAll(async () => {
	({ threadId } = await addReferral({ episodeId: hospital.episodeId, askedBy: hospital.people.surgeon.id }));
	context = contextOf(hospital.people.therapist);
	listen((event) => heard.push(event));
});
beforeEach(() => (heard = []));

function change(name: string): Change<{ name: string }> {
	return {
		result: { name },
		audit: { action: 'entry.posted', objectKind: 'entry', objectId: name, episodeId: hospital.episodeId },
		entries: [{ threadId, kind: 'note', body: name }],
		events: [{ topic: 'referral', kind: 'asked', id: name, episodeId: hospital.episodeId }],
		messages: [
			{
				kind: 'mail',
				channel: 'mail',
				causeKey: name,
				userId: hospital.people.surgeon.id,
				body: name,
				ref: { kind: 'referral', id: name },
				expiresAt: context.now + 1000
			}
		]
	};
}

const run = (name: string, given: Partial<PersonContext> = {}) =>
	write({ ...context, ...given }, 'entry.write', async (tx) => {
		await tx.insert(settings).values({ key: name, value: 1, changedAt: 1 });
		return change(name);
	});

async function traces(name: string): Promise<number[]> {
	const [state, entry, row, event, message] = await Promise.all([
		db().$count(settings, eq(settings.key, name)),
		db().$count(entries, eq(entries.body, name)),
		db().$count(audit, eq(audit.objectId, name)),
		db().$count(liveEvents, eq(liveEvents.subjectId, name)),
		db().$count(outbox, eq(outbox.causeKey, name))
	]);
	return [state, entry, row, event, message];
}

describe('write', () => {
	it('writes state, entry, audit row, live event and message together, and tells after the commit', async () => {
		await run('whole');
		expect(await traces('whole')).toEqual([1, 1, 1, 1, 1]);
		expect(heard.map((event) => event.topic)).toEqual(['referral', 'thread']);
		expect(heard.every((event) => event.unitId === hospital.units.ward)).toBe(true);
	});

	it('leaves nothing of it when any part fails, and tells nobody', async () => {
		const failing = write(context, 'entry.write', async (tx) => {
			await tx.insert(settings).values({ key: 'half', value: 1, changedAt: 1 });
			return { ...change('half'), entries: [{ threadId: 'no-such-thread', kind: 'note', body: 'half' }] };
		});
		await expect(failing).rejects.toThrow('no-such-thread');
		expect(await traces('half')).toEqual([0, 0, 0, 0, 0]);
		expect(heard).toEqual([]);
	});

	it('refuses a role that may not, before any work', async () => {
		let worked = false;
		const refused = write(contextOf(hospital.people.admin), 'entry.write', () => {
			worked = true;
			return Promise.resolve(change('refused'));
		});
		await expect(refused).rejects.toMatchObject({ code: 'not-allowed', status: 403 });
		expect(worked).toBe(false);
	});

	it('refuses nobody at all with 401', async () => {
		const nobody = write({ ...context, actor: null }, 'entry.write', () => Promise.resolve(change('x')));
		await expect(nobody).rejects.toMatchObject({ code: 'not-signed-in' });
	});

	it('gives entries numbers without gaps under parallel writers', async () => {
		await Promise.all(Array.from({ length: 20 }, (_, n) => run(`parallel-${n}`)));
		const rows = await db().select({ seq: entries.seq }).from(entries).orderBy(entries.seq);
		expect(rows.map((row) => row.seq)).toEqual(rows.map((_, index) => index + 1));
	});
});

describe('a write with a key', () => {
	const key = (digest = 'a', path = '/api/x') => ({ key: { key: 'k1', path, digest } });

	it('is done once and answers the same again', async () => {
		expect(await run('once', key())).toEqual({ result: { name: 'once' }, replayed: false });
		expect(await run('never', key())).toEqual({ result: { name: 'once' }, replayed: true });
		expect(await traces('never')).toEqual([0, 0, 0, 0, 0]);
	});

	it('refuses the same key with another body', async () => {
		await expect(run('never', key('b'))).rejects.toMatchObject({ code: 'idempotency-mismatch', status: 422 });
	});

	it('is another write on another path or by another person', async () => {
		expect((await run('other path', key('a', '/api/y'))).replayed).toBe(false);
		const nurse = contextOf(hospital.people.nurse);
		expect((await run('other person', { ...nurse, ...key() })).replayed).toBe(false);
	});

	it('refuses a second request while the first is in flight', async () => {
		const given = { key: { key: 'k2', path: '/api/x', digest: 'a' } };
		const answers = await Promise.allSettled([run('flight', given), run('flight 2', given)]);
		expect(answers.map((answer) => answer.status)).toEqual(['fulfilled', 'rejected']);
		expect(answers[1]).toMatchObject({ reason: { code: 'in-flight', status: 409 } });
		expect(await traces('flight')).toEqual([1, 1, 1, 1, 1]);
	});

	it('keeps no answer for a write that failed', async () => {
		const given = { key: { key: 'k3', path: '/api/x', digest: 'a' } };
		const failed = write({ ...context, ...given }, 'entry.write', () => Promise.reject(new Error('no')));
		await expect(failed).rejects.toThrow('no');
		expect(await db().$count(idempotencyKeys, eq(idempotencyKeys.key, 'k3'))).toBe(0);
		expect((await run('again', given)).replayed).toBe(false);
	});
});

describe('the audit chain', () => {
	it('is intact after all of this', async () => {
		expect(await verifyAudit(db())).toMatchObject({ intact: true });
	});

	it('cannot be changed or shortened through the database', async () => {
		const refused = expect.objectContaining({ message: expect.stringContaining('append-only') });
		await expect(db().run(sql`update audit set actor_id = 'x' where seq = 2`)).rejects.toMatchObject({
			cause: refused
		});
		await expect(db().run(sql`delete from audit where seq = 2`)).rejects.toMatchObject({ cause: refused });
	});

	it('shows an edited row at its number, even when the triggers are gone', async () => {
		await db().run(sql`drop trigger audit_no_update`);
		await db().run(sql`update audit set actor_id = 'somebody else' where seq = 3`);
		expect(await verifyAudit(db())).toEqual({ intact: false, brokenAt: 3 });
	});
});
