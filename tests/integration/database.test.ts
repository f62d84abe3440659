import { spawn } from 'node:child_process';
import { monitorEventLoopDelay } from 'node:perf_hooks';
import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { db, transact } from '$lib/server/db';
import { lockDataFolder } from '$lib/server/db/lock';
import { checkJournal, migrateDatabase } from '$lib/server/db/migrate';
import { settings } from '$lib/server/db/schema';
import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { freshDatabase } from '../support/database';

let close: () => void;
beforeAll(async () => {
	({ close } = await freshDatabase());
});
afterAll(() => close());

const put = (key: string) => ({ key, value: key, changedAt: 1 });

describe('the database client', () => {
	it('lets 60 parallel transactions all succeed and keeps the event loop free', async () => {
		const delay = monitorEventLoopDelay({ resolution: 5 });
		delay.enable();
		await Promise.all(
			Array.from({ length: 60 }, (_, n) =>
				transact(async (tx) => {
					await tx.insert(settings).values(put(`parallel-${n}`));
					await tx.select().from(settings).limit(1);
				})
			)
		);
		delay.disable();
		const rows = await db().select().from(settings);
		expect(rows.filter((row) => row.key.startsWith('parallel-'))).toHaveLength(60);
		expect(delay.max / 1e6).toBeLessThan(100);
	});

	it('queues single writes behind an open transaction', async () => {
		const order: string[] = [];
		const slow = transact(async (tx) => {
			await tx.insert(settings).values(put('slow'));
			await new Promise((resolve) => setImmediate(resolve));
			await tx.insert(settings).values(put('slow-2'));
			order.push('transaction');
		});
		const single = db()
			.insert(settings)
			.values(put('single'))
			.then(() => order.push('single'));
		await Promise.all([slow, single]);
		expect(order).toEqual(['transaction', 'single']);
	});

	it('rolls back as a whole and takes the next write afterwards', async () => {
		await expect(
			transact(async (tx) => {
				await tx.insert(settings).values(put('lost'));
				throw new Error('no');
			})
		).rejects.toThrow('no');
		await db().insert(settings).values(put('kept'));
		const keys = (await db().select().from(settings)).map((row) => row.key);
		expect(keys).toContain('kept');
		expect(keys).not.toContain('lost');
	});

	it('throws instead of waiting for itself when a write goes past the open transaction', async () => {
		const past = transact(async () => {
			await db().insert(settings).values(put('past'));
		});
		await expect(past).rejects.toHaveProperty('cause.message', expect.stringContaining('past it'));
		await expect(transact(() => transact(async () => 1))).rejects.toThrow(/past it/);
	});

	it.each(['synchronous', 'foreign_keys'])('sets %s on every connection', async (pragma) => {
		const read = () => db().get<Record<string, number>>(sql.raw(`PRAGMA ${pragma}`));
		const values = await transact(async (tx) => {
			await tx.insert(settings).values(put(`pragma-${pragma}`));
			// The transaction holds one connection, so the outer handle reads on another.
			return [await tx.get<Record<string, number>>(sql.raw(`PRAGMA ${pragma}`)), await read()];
		});
		const wanted = pragma === 'synchronous' ? 2 : 1;
		expect(values.map((row) => row?.[pragma])).toEqual([wanted, wanted]);
	});
});

describe('append-only tables', () => {
	it.each([
		'audit',
		'entries',
		'clearance_moves',
		'escalation_facts',
		'escalation_moves',
		'findings',
		'readings',
		'unit_limit_changes',
		'unit_activity_changes',
		'level_decisions',
		'wound_notes'
	])('%s refuses update and delete', async (table) => {
		const triggers = await db().all<{ name: string }>(
			sql`select name from sqlite_master where type = 'trigger' and tbl_name = ${table}`
		);
		expect(triggers.map((t) => t.name)).toEqual(
			expect.arrayContaining([`${table}_no_update`, `${table}_no_delete`])
		);
	});
});

describe('migrations', () => {
	it('run a second time without effect', async () => {
		await expect(migrateDatabase(db())).resolves.toBeUndefined();
	});

	it('refuse a journal out of order', () => {
		const entries = [
			{ idx: 0, when: 2, tag: 'a' },
			{ idx: 1, when: 1, tag: 'b' }
		];
		expect(() => checkJournal({ entries })).toThrow('Migration b is not newer than a');
	});

	it('refuse a database that is newer than the program', async () => {
		await db().run(sql`insert into __drizzle_migrations (hash, created_at) values ('later', 9e15)`);
		await expect(migrateDatabase(db())).rejects.toThrow(/older than its data/);
	});
});

describe('the lock on the data folder', () => {
	it('refuses a second process and is free after a kill', async () => {
		const folder = mkdtempSync(path.join(tmpdir(), 'ropewalk-lock-'));
		const script = `const D = require('libsql'); const c = new D(process.argv[1]); c.exec('BEGIN IMMEDIATE'); console.log('held'); setInterval(() => {}, 1000)`;
		const child = spawn(process.execPath, ['-e', script, path.join(folder, 'lock.db')]);
		await new Promise((resolve) => child.stdout.once('data', resolve));
		expect(() => lockDataFolder(folder)).toThrow(/Another Ropewalk process/);
		const gone = new Promise((resolve) => child.once('exit', resolve));
		child.kill('SIGKILL');
		await gone;
		const lock = lockDataFolder(folder);
		expect(() => lockDataFolder(folder)).toThrow(folder);
		lock.release();
	});
});
