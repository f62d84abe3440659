import { spawn } from 'node:child_process';
import { monitorEventLoopDelay } from 'node:perf_hooks';
import { sql } from 'drizzle-orm';
import Database from 'libsql';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { db, transact } from '$lib/server/db';
import { lockData } from '$lib/server/db/lock';
import { checkJournal, migrateDatabase } from '$lib/server/db/migrate';
import { settings } from '$lib/server/db/schema';
import { mkdtempSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { freshDatabase } from '../support/database';

let close: () => void;
let file: string;
beforeAll(async () => {
	({ close, file } = await freshDatabase());
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
	const APPEND_ONLY = [
		'audit',
		'bedside_sessions',
		'clearance_moves',
		'entries',
		'escalation_facts',
		'escalation_moves',
		'escalation_steps',
		'findings',
		'level_decisions',
		'operation_amendments',
		'outbox_attempts',
		'outbox_resends',
		'oxygen_notes',
		'patient_amendments',
		'prescribed_ranges',
		'readings',
		'session_amendments',
		'unit_activity_changes',
		'unit_limit_changes',
		'wound_notes'
	];

	/** A connection that asks for neither parents nor values: what a row says does not matter to a trigger. */
	const careless = () => {
		const connection = new Database(file);
		connection.exec('pragma foreign_keys = off; pragma ignore_check_constraints = on');
		return connection;
	};

	interface Column {
		name: string;
		type: string;
	}

	/** A row with something in every column that asks for it. */
	function addRow(connection: Database.Database, table: string): void {
		const columns = connection
			.prepare('select name, type from pragma_table_info(?) where "notnull" = 1 or pk > 0')
			.all(table) as Column[];
		const names = columns.map(({ name }) => `"${name}"`).join();
		const values = columns.map(({ type }) => (type === 'TEXT' ? `'x'` : '7')).join();
		connection.exec(`insert into ${table} (${names}) values (${values})`);
	}

	it('are these, with a trigger against each of the two', async () => {
		const triggers = await db().all<{ name: string }>(
			sql`select name from sqlite_master where type = 'trigger' and (name like '%_no_update' or name like '%_no_delete')`
		);
		// What a limit of a patient says is kept by a trigger of its own; limits.test.ts covers it.
		const guards = triggers.map(({ name }) => name).filter((name) => !name.startsWith('patient_limits'));
		const wanted = APPEND_ONLY.flatMap((table) => [`${table}_no_delete`, `${table}_no_update`]);
		expect(guards.toSorted()).toEqual(wanted);
	});

	it.each(APPEND_ONLY)('%s refuses update and delete', (table) => {
		const connection = careless();
		addRow(connection, table);
		const rows = () => connection.prepare(`select * from ${table}`).all() as Record<string, unknown>[];
		const before = rows();
		expect(before).toHaveLength(1);
		const columns = Object.keys(before[0] ?? {});
		const changes = columns.map((column) => `update ${table} set "${column}" = 1`);
		for (const change of [...changes, `delete from ${table}`]) {
			expect(() => connection.exec(change), change).toThrow(`${table} is append-only`);
		}
		expect(rows()).toEqual(before);
		connection.close();
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

describe('the lock on folder and database', () => {
	const newFolder = () => mkdtempSync(path.join(tmpdir(), 'ropewalk-lock-'));
	const fileIn = (folder: string) => `file:${path.join(folder, 'ropewalk.db')}`;

	it('refuses a second process and is free after a kill', async () => {
		const folder = newFolder();
		const script = `const D = require('libsql'); const c = new D(process.argv[1]); c.exec('BEGIN IMMEDIATE'); console.log('held'); setInterval(() => {}, 1000)`;
		const child = spawn(process.execPath, ['-e', script, path.join(folder, 'lock.db')]);
		await new Promise((resolve) => child.stdout.once('data', resolve));
		expect(() => lockData(folder, fileIn(folder))).toThrow(/Another Ropewalk process/);
		const gone = new Promise((resolve) => child.once('exit', resolve));
		child.kill('SIGKILL');
		await gone;
		const lock = lockData(folder, fileIn(folder));
		expect(() => lockData(folder, fileIn(folder))).toThrow(folder);
		lock.release();
	});

	it('refuses one database to two folders, and leaves the second folder free', () => {
		const [here, there, shared] = [newFolder(), newFolder(), newFolder()];
		const lock = lockData(here, fileIn(shared));
		expect(() => lockData(there, fileIn(shared))).toThrow(`the database ${fileIn(shared).slice(5)}`);
		const other = lockData(there, fileIn(there));
		other.release();
		lock.release();
		lockData(there, fileIn(shared)).release();
	});

	it.each([
		['by a longer way', (shared: string) => `file:${shared}/../${path.basename(shared)}/ropewalk.db`],
		['from where the process runs', (shared: string) => `file:${path.relative('.', shared)}/ropewalk.db`],
		['with three strokes', (shared: string) => `file://${shared}/ropewalk.db`],
		['through a link to its folder', (shared: string) => fileIn(linkTo(shared))],
		['through a link to the file', (shared: string) => `file:${linkTo(path.join(shared, 'ropewalk.db'))}`]
	])('knows the same database %s', (_, written) => {
		const shared = newFolder();
		writeFileSync(path.join(shared, 'ropewalk.db'), '');
		const lock = lockData(newFolder(), fileIn(shared));
		expect(() => lockData(newFolder(), written(shared))).toThrow(/is using the database/);
		lock.release();
	});

	it('knows it by a link to its folder before the first start has made the file', () => {
		const shared = newFolder();
		const lock = lockData(newFolder(), fileIn(shared));
		expect(() => lockData(newFolder(), fileIn(linkTo(shared)))).toThrow(/is using the database/);
		lock.release();
	});

	function linkTo(target: string): string {
		const link = path.join(newFolder(), 'link');
		symlinkSync(target, link);
		return link;
	}
});
