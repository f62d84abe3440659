import { AsyncLocalStorage } from 'node:async_hooks';
import { setTimeout as pause } from 'node:timers/promises';
import { Sqlite3Client } from '@libsql/client/sqlite3';
import type { InArgs, InStatement, ResultSet, Transaction, TransactionMode } from '@libsql/client/sqlite3';
import { Mutex } from './mutex';
import { isBusy } from './pool';

const READ = /^\s*(select|explain|pragma|values|with\b(?![\s\S]*\b(insert|update|delete)\b))/i;
const BUSY_PATIENCE_MS = 5_000;

/** Marks the asynchronous call chain that holds the write lock, to turn a deadlock into an error. */
const holder = new AsyncLocalStorage<{ held: boolean }>();

/**
 * The client handed to Drizzle. Its calls are synchronous underneath, and two overlapping write transactions
 * fail with "database is locked", so every write queues behind one mutex here, where nothing can go round it:
 * single statements, batches, migrations and whole transactions until they settle. Reads pass through.
 */
export class SerialClient extends Sqlite3Client {
	readonly #mutex = new Mutex();

	override async execute(statement: InStatement | string, args?: InArgs): Promise<ResultSet> {
		const sql = typeof statement === 'string' ? statement : statement.sql;
		// Without arguments of its own the base class must see exactly one parameter.
		const call = () =>
			typeof statement === 'string' ? super.execute(statement, args) : super.execute(statement);
		return READ.test(sql) ? call() : this.#write(sql, call);
	}

	override async batch(statements: Array<InStatement | [string, InArgs?]>): Promise<ResultSet[]> {
		return this.#write('batch', () => super.batch(statements, 'write'));
	}

	override async migrate(statements: InStatement[]): Promise<ResultSet[]> {
		return this.#write('migrate', () => super.migrate(statements));
	}

	override async executeMultiple(sql: string): Promise<void> {
		return this.#write('executeMultiple', () => super.executeMultiple(sql));
	}

	override async transaction(_mode?: TransactionMode): Promise<Transaction> {
		const mine = holder.getStore();
		refuseInside(mine, 'a second transaction');
		const release = await this.#mutex.acquire();
		try {
			const transaction = await retryBusy(() => super.transaction('write'));
			if (mine) {
				mine.held = true;
			}
			return new HeldTransaction(transaction, () => {
				if (mine) {
					mine.held = false;
				}
				release();
			});
		} catch (error) {
			release();
			throw error;
		}
	}

	async #write<T>(what: string, call: () => Promise<T>): Promise<T> {
		refuseInside(holder.getStore(), what);
		return this.#mutex.run(() => retryBusy(call));
	}
}

/** Run work whose writes are watched: a write past the open transaction throws instead of waiting for itself. */
export async function watched<T>(work: () => Promise<T>): Promise<T> {
	refuseInside(holder.getStore(), 'a second transaction');
	return holder.run({ held: false }, work);
}

function refuseInside(mine: { held: boolean } | undefined, what: string): void {
	if (mine?.held) {
		throw new Error(
			`${what.slice(0, 80)}: this runs inside an open transaction but past it; use the transaction's own handle.`
		);
	}
}

/** Another process may hold the file for a moment (a check, a backup tool): wait without blocking the event loop. */
async function retryBusy<T>(call: () => Promise<T>): Promise<T> {
	const started = performance.now();
	for (;;) {
		try {
			return await call();
		} catch (error) {
			if (!isBusy(error) || performance.now() - started > BUSY_PATIENCE_MS) {
				throw error;
			}
			await pause(5 + Math.random() * 20);
		}
	}
}

/** A transaction that gives the write lock back exactly once, however it ends. */
class HeldTransaction implements Transaction {
	constructor(
		private readonly inner: Transaction,
		private readonly release: () => void
	) {}

	get closed(): boolean {
		return this.inner.closed;
	}

	execute(statement: InStatement): Promise<ResultSet>;
	execute(sql: string, args?: InArgs): Promise<ResultSet>;
	execute(statement: InStatement | string, args?: InArgs): Promise<ResultSet> {
		return this.inner.execute(
			typeof statement === 'string' ? { sql: statement, args: args ?? [] } : statement
		);
	}

	batch(statements: Array<InStatement | [string, InArgs?]>): Promise<ResultSet[]> {
		return this.inner.batch(statements as InStatement[]);
	}

	executeMultiple(sql: string): Promise<void> {
		return this.inner.executeMultiple(sql);
	}

	async commit(): Promise<void> {
		// A failed commit keeps the lock: the caller rolls back, and that releases it.
		await this.inner.commit();
		this.release();
	}

	async rollback(): Promise<void> {
		try {
			await this.inner.rollback();
		} finally {
			this.release();
		}
	}

	close(): void {
		this.inner.close();
		this.release();
	}
}
