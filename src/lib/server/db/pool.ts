import { ConnectionPool } from '@libsql/client/sqlite3';
import type Database from 'libsql';

type Connection = Database.Database;

/**
 * libSQL's client keeps a pool of connections, and most PRAGMAs last only as long as a connection. This pool
 * sets them on every new one. It also keeps a broken connection from going back: a statement that fails with
 * SQLITE_BUSY is not reset by the native driver, and later commits on that connection fail.
 * `ConnectionPool` is exported but marked private, so the client's version is pinned exactly.
 */
export class CarefulPool extends ConnectionPool {
	readonly #known = new WeakSet<Connection>();
	readonly #poisoned = new WeakSet<Connection>();

	override acquireSync(forTransaction = false): Connection {
		const connection = super.acquireSync(forTransaction);
		if (!this.#known.has(connection)) {
			this.#known.add(connection);
			this.#prepareConnection(connection);
		}
		return connection;
	}

	override release(connection: Connection): void {
		if (this.#poisoned.has(connection) && connection.open) {
			connection.close();
		}
		super.release(connection);
	}

	#prepareConnection(connection: Connection): void {
		// Clinical records: a commit that was answered must survive the loss of power.
		connection.exec('PRAGMA synchronous = FULL; PRAGMA temp_store = MEMORY; PRAGMA cache_size = -16000;');
		const prepare = connection.prepare.bind(connection);
		connection.prepare = ((source: string) => {
			const statement = prepare(source);
			const guard =
				<A extends unknown[], R>(call: (...args: A) => R) =>
				(...args: A): R => {
					try {
						return call(...args);
					} catch (error) {
						if (isBusy(error)) {
							this.#poisoned.add(connection);
						}
						throw error;
					}
				};
			statement.run = guard(statement.run.bind(statement));
			statement.all = guard(statement.all.bind(statement));
			return statement;
		}) as typeof connection.prepare;
	}
}

/** True for SQLITE_BUSY and SQLITE_LOCKED with all their extended codes, wrapped or not. */
export function isBusy(error: unknown): boolean {
	for (let e = error; e instanceof Error; e = e.cause) {
		const code = (e as { code?: unknown }).code;
		if (typeof code === 'string' && /^SQLITE_(BUSY|LOCKED)/.test(code)) {
			return true;
		}
	}
	return false;
}
