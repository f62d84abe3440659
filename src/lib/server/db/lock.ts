import path from 'node:path';
import Database from 'libsql';

/**
 * One process owns the database. For its life it holds a write transaction on a small file beside it: a second
 * process is refused at once, and the operating system frees the lock when the owner is killed.
 * The bundled SQLite is older than 3.51.3, whose write-ahead log can in rare cases be damaged when two
 * processes write in the same instant; within one process this cannot happen.
 * @throws Error naming the folder when another process holds it.
 */
export function lockDataFolder(dataDir: string): { release(): void } {
	const file = path.join(dataDir, 'lock.db');
	const connection = new Database(file, { timeout: 0 });
	try {
		connection.exec('BEGIN IMMEDIATE');
	} catch (error) {
		connection.close();
		throw new Error(
			`Another Ropewalk process is using ${dataDir}. Stop it first, or give this one its own DATA_DIR.`,
			{ cause: error }
		);
	}
	return { release: () => connection.close() };
}
