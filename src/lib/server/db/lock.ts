import path from 'node:path';
import Database from 'libsql';
import { databaseFile } from './file';

/** What a process owns for its life. */
export interface Lock {
	release(): void;
}

/**
 * One process owns the database and the folder of its data. For its life it holds a write transaction on a small
 * file beside each: a second process is refused at once, and the operating system frees the locks when the owner is
 * killed. Two folders do not make two owners of one database: its file is locked too, wherever it lies.
 * The bundled SQLite is older than 3.51.3, whose write-ahead log can in rare cases be damaged when two
 * processes write in the same instant; within one process this cannot happen.
 * @param databaseUrl the `file:` address that is opened afterwards
 * @throws Error naming the folder or the file, when another process holds it.
 */
export function lockData(dataDir: string, databaseUrl: string): Lock {
	const folder = hold(
		path.join(dataDir, 'lock.db'),
		`Another Ropewalk process is using ${dataDir}. Stop it first, or give this one its own DATA_DIR.`
	);
	try {
		const file = databaseFile(databaseUrl);
		const database = hold(
			`${file}.lock`,
			`Another Ropewalk process is using the database ${file}. Stop it first, or give this one its own DATABASE_URL.`
		);
		return {
			release() {
				database.release();
				folder.release();
			}
		};
	} catch (error) {
		folder.release();
		throw error;
	}
}

/** @throws Error with `refusal`, when another process holds it. */
function hold(file: string, refusal: string): Lock {
	const connection = new Database(file, { timeout: 0 });
	try {
		connection.exec('BEGIN IMMEDIATE');
	} catch (error) {
		connection.close();
		throw new Error(refusal, { cause: error });
	}
	return { release: () => connection.close() };
}
