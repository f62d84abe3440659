import { rmSync } from 'node:fs';
import { drizzle, type LibSQLDatabase } from 'drizzle-orm/libsql';
import { SerialClient, watched } from './client';
import { databaseFile } from './file';
import { CarefulPool } from './pool';
import * as schema from './schema';

export type Db = LibSQLDatabase<typeof schema>;
/** The handle inside a transaction. */
export type Tx = Parameters<Parameters<Db['transaction']>[0]>[0];
/** What a query needs: it reads the same inside and outside a transaction. */
export type Reader = Pick<Db, 'select' | 'selectDistinct' | 'query' | 'all' | 'get' | '$count'>;

const BUSY_TIMEOUT_MS = 50;
const MAX_CONNECTIONS = 20;

interface Open {
	db: Db;
	client: SerialClient;
	url: string;
}

// In development the module is evaluated anew after a change while the old connections live on.
const holder = globalThis as typeof globalThis & { __ropewalkDb?: Open | null };

/**
 * Open the database of this process. `url` is a `file:` address; the file is made when it is missing.
 * @throws Error when a database is already open.
 */
export async function openDatabase(url: string): Promise<Db> {
	if (holder.__ropewalkDb) {
		throw new Error('The database of this process is already open.');
	}
	const pool = new CarefulPool(url.replace(/^file:/, ''), { timeout: BUSY_TIMEOUT_MS }, MAX_CONNECTIONS);
	const client = new SerialClient(pool, 'number');
	await client.execute('PRAGMA journal_mode = WAL');
	const db = drizzle(client, { schema });
	holder.__ropewalkDb = { db, client, url };
	return db;
}

/** The database of this process. */
export function db(): Db {
	return opened().db;
}

function opened(): Open {
	if (!holder.__ropewalkDb) {
		throw new Error('The database is not open yet: openDatabase() runs in the start of the server.');
	}
	return holder.__ropewalkDb;
}

export function isDatabaseOpen(): boolean {
	return Boolean(holder.__ropewalkDb);
}

export function closeDatabase(): void {
	holder.__ropewalkDb?.client.close();
	holder.__ropewalkDb = null;
}

/**
 * Throw the database of this process away, with all that is in it, and open an empty one in its place, without
 * tables. Only for what nobody has ever worked in: a demonstration whose making was interrupted.
 * @throws Error when no database is open.
 */
export async function replaceDatabase(): Promise<Db> {
	const { url } = opened();
	closeDatabase();
	const file = databaseFile(url);
	// The file goes last: whatever is left by a kill in between is still a database of the same kind, or none.
	for (const part of [`${file}-wal`, `${file}-shm`, file]) {
		rmSync(part, { force: true });
	}
	return openDatabase(url);
}

/**
 * Run `work` in one write transaction. Await nothing but `tx.*` inside: hashing, HTTP and mail happen outside,
 * because every other write waits meanwhile.
 */
export function transact<T>(work: (tx: Tx) => Promise<T>): Promise<T> {
	return watched(() => db().transaction(work));
}

/** True when a write failed because a unique index already holds that value. */
export function isUniqueViolation(error: unknown): boolean {
	for (let e = error; e instanceof Error; e = e.cause) {
		if ((e as { extendedCode?: unknown }).extendedCode === 'SQLITE_CONSTRAINT_UNIQUE') {
			return true;
		}
	}
	return false;
}
